import type { Day } from './days.ts'
import type { AdviceReply } from './schoolAdvice.ts'
import type { SessionType } from './sessionNotes.ts'
import type { SampleScript, SampleTask, SmudgeLevel } from './handwriting.ts'

/** Words taken from the record, with the place they stand in, e.g. 'Session note of 3 Mar 2026'. */
export interface SourcedText {
  text: string
  source: string
}

/** A sample's own counts; the letter sets them side by side only for the same task in the same script. */
export interface SampleFacts {
  takenOn: Day
  task: SampleTask
  script: SampleScript
  letters: number | null
  legibleLetters: number | null
  lettersPerMinute: number | null
  reversals: number | null
  smudge: SmudgeLevel | null
}

/** A goal as the family may read it: the levels are the sentences the therapist wrote, never a score. */
export interface GoalFacts {
  activity: string
  childVoice: string
  setOn: Day
  /** What was seen at the start. */
  baselineText: string
  latest: { level: number; text: string; ratedOn: Day } | null
  /** Sessions of this period whose notes touch the goal. */
  sessions: number
}

export interface HomeFacts extends SourcedText {
  minutes: number | null
}

export interface SchoolFacts extends SourcedText {
  reply: AdviceReply | null
}

/**
 * Everything a progress letter may be assembled from. There is no field for a quotient, an index or a T-score, for
 * another child, or for the other household: what has no field cannot be printed by mistake.
 */
export interface ProgressFacts {
  /** The name the child goes by. */
  childName: string
  /** Names in the greeting. Empty when the letter goes to two households: then nobody is named. */
  addressedTo: readonly string[]
  author: string
  clinicName: string
  clinicPhone: string | null
  /** Sessions that took place, in any order. */
  sessions: readonly { heldOn: Day; type: SessionType }[]
  strengths: readonly SourcedText[]
  childWords: readonly SourcedText[]
  samples: readonly SampleFacts[]
  goals: readonly GoalFacts[]
  /** Advice for families that the therapist published, most useful first; the letter takes three. */
  home: readonly HomeFacts[]
  /** Plan of the last signed note: offered to the author inside a gap, never printed as it stands. */
  lastPlan: { text: string; heldOn: Day } | null
  schoolAdvice: readonly SchoolFacts[]
  nextVisitOn: Day | null
}
