import { boolean, number, type InferType, type Schema } from 'yup'
import { dayField, optionalDayField, type Day } from './days.ts'
import { body, optionalChoice, optionalId, optionalText } from './fields.ts'
import { pastDayProblem } from './recordDays.ts'

/** `guardian` for a carer who answers, `therapist` for one who writes down what was told. */
export const historyInformants = ['guardian', 'therapist'] as const
export type HistoryInformant = (typeof historyInformants)[number]
export const historyInformantLabels: Record<HistoryInformant, string> = {
  guardian: 'Answered by the family',
  therapist: 'Written down by the therapist',
}

export const handConsistencies = [
  'always',
  'mostly',
  'swaps_within_task',
  'swaps_between_tasks',
  'unsure',
] as const
export type HandConsistency = (typeof handConsistencies)[number]

/** 'unsure' is an answer; null is "not answered yet". */
export const yesNoUnsure = ['yes', 'no', 'unsure'] as const
export type YesNoUnsure = (typeof yesNoUnsure)[number]

export const relativeHands = ['left', 'right', 'both', 'unsure'] as const
export type RelativeHand = (typeof relativeHands)[number]

export interface FamilyHands {
  /** By birth: adoption does not change what is asked here, and 'unsure' is an answer. */
  mother: RelativeHand | null
  father: RelativeHand | null
  /** Brothers and sisters, and how many of them write with the left hand. */
  siblings: number | null
  siblingsUnsure: boolean
  leftHandedSiblings: number | null
  twin: YesNoUnsure | null
  others: string | null
}

/** The history of domain step 4. Null is "not answered yet", everywhere; an `…Unsure` that is true is an answer. */
export interface HistoryDetails {
  /** Completed weeks of pregnancy. */
  gestationWeeks: number | null
  gestationUnsure: boolean
  /** Age in months, counted from birth, as the family remembers it. */
  firstNoticedMonths: number | null
  firstNoticedUnsure: boolean
  /** Whether that early preference was nearly always the same hand. */
  earlySteady: YesNoUnsure | null
  consistency: HandConsistency | null
  askedToSwitch: YesNoUnsure | null
  askedToSwitchBy: string | null
  /** In years. */
  askedToSwitchAge: number | null
  /** The child was punished or shamed for using a hand. */
  punishedForHand: YesNoUnsure | null
  family: FamilyHands
  handChanged: YesNoUnsure | null
  handChangedOn: Day | null
  handChangedOnUnsure: boolean
  injury: YesNoUnsure | null
  injuryWhat: string | null
  injuryOn: Day | null
  injuryOnUnsure: boolean
  seizure: YesNoUnsure | null
  newWeakness: YesNoUnsure | null
  numbness: YesNoUnsure | null
  faceDroop: YesNoUnsure | null
  newHeadache: YesNoUnsure | null
  walkChanged: YesNoUnsure | null
  lostSkill: YesNoUnsure | null
  lostSkillWhat: string | null
  otherHandHardlyUsed: YesNoUnsure | null
  otherHandFisted: YesNoUnsure | null
  dropsThings: YesNoUnsure | null
  /** One arm or leg weaker, stiffer or smaller than the other. */
  weakerSide: YesNoUnsure | null
  /** Sat without help by 8 months, walked by 18 months, counted from the due date. */
  satInTime: YesNoUnsure | null
  walkedInTime: YesNoUnsure | null
  tremor: YesNoUnsure | null
  tremorSudden: YesNoUnsure | null
  wideMotorDifficulty: YesNoUnsure | null
  visionChecked: YesNoUnsure | null
  hearingChecked: YesNoUnsure | null
  /** 0 to 10 after ten minutes of writing or drawing. */
  pain: number | null
  painUnsure: boolean
  painWhere: string | null
  enjoys: string | null
  childsWords: string | null
  anythingElse: string | null
}

/** A history in which nothing is answered yet. */
export const emptyHistory: HistoryDetails = {
  gestationWeeks: null,
  gestationUnsure: false,
  firstNoticedMonths: null,
  firstNoticedUnsure: false,
  earlySteady: null,
  consistency: null,
  askedToSwitch: null,
  askedToSwitchBy: null,
  askedToSwitchAge: null,
  punishedForHand: null,
  family: {
    mother: null,
    father: null,
    siblings: null,
    siblingsUnsure: false,
    leftHandedSiblings: null,
    twin: null,
    others: null,
  },
  handChanged: null,
  handChangedOn: null,
  handChangedOnUnsure: false,
  injury: null,
  injuryWhat: null,
  injuryOn: null,
  injuryOnUnsure: false,
  seizure: null,
  newWeakness: null,
  numbness: null,
  faceDroop: null,
  newHeadache: null,
  walkChanged: null,
  lostSkill: null,
  lostSkillWhat: null,
  otherHandHardlyUsed: null,
  otherHandFisted: null,
  dropsThings: null,
  weakerSide: null,
  satInTime: null,
  walkedInTime: null,
  tremor: null,
  tremorSudden: null,
  wideMotorDifficulty: null,
  visionChecked: null,
  hearingChecked: null,
  pain: null,
  painUnsure: false,
  painWhere: null,
  enjoys: null,
  childsWords: null,
  anythingElse: null,
}

const whole = (label: string, min: number, max: number, unit: string) =>
  number()
    .nullable()
    .defined()
    .integer(`${label}: a whole number of ${unit}`)
    .min(min, `${label}: ${min} to ${max} ${unit}`)
    .max(max, `${label}: ${min} to ${max} ${unit}`)
const answer = () => optionalChoice('an answer', yesNoUnsure)
const words = (label: string, max = 500) => optionalText(label, { max })
const unsure = () => boolean().required('The answer is missing')

/** Everything may be null: a history is saved as it is answered. Every field must be present. */
export const historyDetailsSchema: Schema<HistoryDetails> = body({
  gestationWeeks: whole('Weeks of pregnancy', 22, 44, 'weeks'),
  gestationUnsure: unsure(),
  firstNoticedMonths: whole('Age when a favourite hand showed', 0, 168, 'months'),
  firstNoticedUnsure: unsure(),
  earlySteady: answer(),
  consistency: optionalChoice('how steady the hand is', handConsistencies),
  askedToSwitch: answer(),
  askedToSwitchBy: words('Who asked', 200),
  askedToSwitchAge: whole('Age at that time', 0, 17, 'years'),
  punishedForHand: answer(),
  family: body({
    mother: optionalChoice('the mother’s hand', relativeHands),
    father: optionalChoice('the father’s hand', relativeHands),
    siblings: whole('Brothers and sisters', 0, 20, 'children'),
    siblingsUnsure: unsure(),
    leftHandedSiblings: whole('Left-handed brothers and sisters', 0, 20, 'children').test(
      'among-siblings',
      'This is more than the number of brothers and sisters',
      function (left) {
        const siblings = (this.parent as FamilyHands).siblings
        return left === null || siblings === null || left <= siblings
      },
    ),
    twin: answer(),
    others: words('Other left-handed relatives', 300),
  }),
  handChanged: answer(),
  handChangedOn: optionalDayField('The date of the change'),
  handChangedOnUnsure: unsure(),
  injury: answer(),
  injuryWhat: words('What happened'),
  injuryOn: optionalDayField('The date of the injury or illness'),
  injuryOnUnsure: unsure(),
  seizure: answer(),
  newWeakness: answer(),
  numbness: answer(),
  faceDroop: answer(),
  newHeadache: answer(),
  walkChanged: answer(),
  lostSkill: answer(),
  lostSkillWhat: words('What the child could do before'),
  otherHandHardlyUsed: answer(),
  otherHandFisted: answer(),
  dropsThings: answer(),
  weakerSide: answer(),
  satInTime: answer(),
  walkedInTime: answer(),
  tremor: answer(),
  tremorSudden: answer(),
  wideMotorDifficulty: answer(),
  visionChecked: answer(),
  hearingChecked: answer(),
  pain: whole('Pain', 0, 10, 'points'),
  painUnsure: unsure(),
  painWhere: words('Where it hurts', 200),
  enjoys: words('What the child enjoys', 1000),
  childsWords: words('The child’s own words', 1000),
  anythingElse: words('Anything else', 2000),
})

/** A therapist begins to write down what was told. */
export const historyStartSchema = body({
  respondentName: words('Who told it', 120),
  answeredOn: dayField('The date it was told'),
  /** A locked history that this one replaces. */
  replacesId: optionalId('The earlier history'),
})
export type HistoryStart = InferType<typeof historyStartSchema>

export const historyDraftSchema = body({
  respondentName: words('Who told it', 120),
  answeredOn: dayField('The date it was told'),
  details: historyDetailsSchema as Schema<HistoryDetails>,
})
export interface HistoryDraft {
  respondentName: string | null
  answeredOn: Day
  details: HistoryDetails
}

/** Days in a history that cannot be, by field: after today or before the child was born. */
export function historyDayProblems(
  details: HistoryDetails,
  life: { birthDate: Day; today: Day },
): Record<string, string> {
  const found: Record<string, string> = {}
  const check = (field: 'handChangedOn' | 'injuryOn', label: string) => {
    const day = details[field]
    const problem = day === null ? null : pastDayProblem(label, day, life)
    if (problem !== null) found[field] = problem
  }
  check('handChangedOn', 'The date of the change')
  check('injuryOn', 'The date of the injury or illness')
  return found
}

/** The word for a finished history: a therapist signs, a family sends. */
export const historyFinishedLabels: Record<HistoryInformant, string> = {
  guardian: 'Sent',
  therapist: 'Signed',
}

export interface HistoryView {
  id: string
  childId: string
  informant: HistoryInformant
  respondentName: string | null
  answeredOn: Day
  details: HistoryDetails
  /** Ids of the questions without an answer. */
  missing: string[]
  /** Clinic setting: months since birth below which an age is counted from the due date. */
  correctedUntilMonths: number
  lockedAt: string | null
  lockedBy: string | null
  replacesId: string | null
  replacedById: string | null
  /** Begun for a request that ended before it was sent: nobody can finish it, and the therapist may discard it. */
  leftOver: boolean
  version: number
  can: { change: boolean; lock: boolean; discard: boolean; replace: boolean }
}
