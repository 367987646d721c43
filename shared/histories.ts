import type { Day } from './days.ts'

export const historyInformants = ['guardian', 'therapist'] as const
export type HistoryInformant = (typeof historyInformants)[number]

export const handConsistencies = ['always', 'mostly', 'swaps_within_task', 'swaps_between_tasks'] as const
export type HandConsistency = (typeof handConsistencies)[number]

/** 'unsure' is an answer; null is "not answered yet". */
export type YesNoUnsure = 'yes' | 'no' | 'unsure'

export interface FamilyHands {
  mother: 'left' | 'right' | 'both' | 'unsure' | null
  father: 'left' | 'right' | 'both' | 'unsure' | null
  /** Brothers and sisters, and how many of them write with the left hand. */
  siblings: number | null
  leftHandedSiblings: number | null
  twin: YesNoUnsure | null
  others: string | null
}

/** The history of domain step 4. Null is "not answered yet", everywhere. */
export interface HistoryDetails {
  gestationWeeks: number | null
  gestationUnsure: boolean
  firstNoticedMonths: number | null
  firstNoticedUnsure: boolean
  consistency: HandConsistency | null
  askedToSwitch: YesNoUnsure | null
  askedToSwitchBy: string | null
  askedToSwitchAge: number | null
  /** The child was punished or shamed for using a hand. */
  punishedForHand: YesNoUnsure | null
  family: FamilyHands
  handChanged: YesNoUnsure | null
  handChangedOn: Day | null
  injury: YesNoUnsure | null
  injuryWhat: string | null
  injuryOn: Day | null
  seizure: YesNoUnsure | null
  newWeakness: YesNoUnsure | null
  numbness: YesNoUnsure | null
  faceDroop: YesNoUnsure | null
  newHeadache: YesNoUnsure | null
  lostSkill: YesNoUnsure | null
  lostSkillWhat: string | null
  otherHandHardlyUsed: YesNoUnsure | null
  otherHandFisted: YesNoUnsure | null
  dropsThings: YesNoUnsure | null
  tremor: YesNoUnsure | null
  tremorSudden: YesNoUnsure | null
  wideMotorDifficulty: YesNoUnsure | null
  visionChecked: YesNoUnsure | null
  hearingChecked: YesNoUnsure | null
  /** 0 to 10 after ten minutes of writing or drawing; null when not answered. */
  pain: number | null
  painWhere: string | null
  enjoys: string | null
  childsWords: string | null
  anythingElse: string | null
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
  lockedAt: string | null
  lockedBy: string | null
  replacesId: string | null
  replacedById: string | null
  version: number
  can: { change: boolean; lock: boolean; replace: boolean }
}
