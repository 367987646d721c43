import { unknownFacts, type AdviceFacts } from './adviceFacts.ts'
import type { WritingHand } from './children.ts'
import { ageInMonths, compareDays, type Day } from './days.ts'
import { topicsOfGoal } from './goalTopics.ts'
import type { HandUseAnswer } from './handUse.ts'
import { lettersPerMinute, percentLegible } from './handwriting.ts'
import type { HandUseAnswers } from './questionnaires.ts'
import type { ReferralConcern, ScriptDirection } from './referrals.ts'
import type { SampleDetails } from './samples.ts'
import type { WritingObservationDetails, YesNo } from './writingObservations.ts'

/** The parts of a record that advice is chosen from: the newest of each kind, null where there is none. */
export interface AdviceRecord {
  today: Day
  birthDate: Day
  writingHand: WritingHand | null
  scriptDirection: ScriptDirection | null
  concerns: readonly ReferralConcern[]
  observation: WritingObservationDetails | null
  /** Answers of the newest locked questionnaire that asks about writing and cutting. */
  handUse: HandUseAnswers | null
  sample: SampleDetails | null
  /** Activities of the goals that are still open. */
  goals: readonly string[]
}

/** The hand an answer names. "Does not do this yet" and no answer name none. */
function handOf(answer: HandUseAnswer | null | undefined): WritingHand | null {
  if (answer === 'strong_left' || answer === 'left') return 'left'
  if (answer === 'strong_right' || answer === 'right') return 'right'
  return answer === 'either' ? 'swaps' : null
}

/** The clinic's everyday form asks of drawing and writing in one, the forms after published tasks of writing alone. */
const writes = (answers: HandUseAnswers | null) => answers?.draws_writes ?? answers?.write

const trueOrFalse = (answer: YesNo | null): boolean | null => (answer === null ? null : answer === 'yes')

const fromObservation = (seen: WritingObservationDetails): Partial<AdviceFacts> => ({
  paperOffsetCm: seen.paperOffsetCm,
  paperTiltDegrees: seen.paperTiltDegrees,
  otherHandSteadies: seen.otherHandSteadies,
  wristPosture: seen.wristPosture,
  grip: seen.grip,
  fingerToTipMm: seen.fingerToTipMm,
  pressure: seen.pressure,
  painAfter: seen.painAfter,
  deskType: seen.deskType,
  elbowClash: trueOrFalse(seen.elbowClash),
  leftClearanceCm: seen.leftClearanceCm,
  lightSide: seen.lightSide,
  feetFlat: trueOrFalse(seen.feetFlat),
  deskAboveElbowCm: seen.deskAboveElbowCm,
})

const fromSample = (sample: SampleDetails): Partial<AdviceFacts> => ({
  smudge: sample.smudge,
  reversals: sample.reversals,
  lettersPerMinute: lettersPerMinute(sample),
  legiblePercent: percentLegible({ legible: sample.legibleLetters, attempted: sample.letters }),
})

/**
 * The facts advice is chosen from, read off a record. What was not looked at stays null: an unknown fact offers
 * nothing. The writing hand is the therapist's word, else what was seen, else what was answered.
 */
export const adviceFactsFromRecord = (record: AdviceRecord): AdviceFacts => ({
  ...unknownFacts,
  ...(record.observation && fromObservation(record.observation)),
  ...(record.sample && fromSample(record.sample)),
  ageMonths:
    compareDays(record.today, record.birthDate) < 0 ? null : ageInMonths(record.birthDate, record.today),
  writingHand: record.writingHand ?? record.observation?.writingHand ?? handOf(writes(record.handUse)),
  cuttingHand: handOf(record.handUse?.scissors),
  scriptDirection: record.scriptDirection,
  concerns: record.concerns,
  goalTopics: [...new Set(record.goals.flatMap(topicsOfGoal))],
})
