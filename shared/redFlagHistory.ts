import type { Hand } from './roles.ts'
import type { HandSkill } from './skillGap.ts'

/** What referral and history say. Null is "not asked or not known". */
export interface RedFlagHistory {
  ageMonths: number | null
  /** Calendar age in months at which one hand was first preferred, as the family remembers it. */
  firstPreferenceMonths: number | null
  /** Whether that early preference was steady. */
  preferenceConsistent: boolean | null
  /** Completed weeks; the corrected age is used when known. */
  gestationWeeks: number | null
  handChanged: boolean | null
  /** The family is not sure whether the hand changed: it raises nothing by itself, and counts beside headaches. */
  handMayHaveChanged: boolean | null
  /** Somebody asked the child to use another hand. It raises nothing by itself. */
  askedToSwitch: boolean | null
  newWeakness: boolean | null
  numbness: boolean | null
  faceDroop: boolean | null
  newHeadache: boolean | null
  seizure: boolean | null
  /** Pain, injury or plaster that explains the change of hand. */
  armInjury: boolean | null
  /** A new change in the way of walking. */
  walkChanged: boolean | null
  otherHandHardlyUsed: boolean | null
  otherHandFisted: boolean | null
  dropsThings: boolean | null
  /** One arm or leg weaker, stiffer or smaller than the other. */
  weakerSide: boolean | null
  lostSkill: boolean | null
  tremor: boolean | null
  tremorSudden: boolean | null
  otherNeurologicalSigns: boolean | null
  /** By 8 and by 18 months, counted from the due date. */
  satInTime: boolean | null
  walkedInTime: boolean | null
  swapsWithinTask: boolean | null
  wideMotorDifficulty: boolean | null
  /** 0 to 10 after ten minutes of writing. */
  painAfter: number | null
  punishedForHand: boolean | null
  notBroughtInSixMonths: number | null
  /** Null when not known or when the child swaps. */
  writingHand: Hand | null
  skills: readonly HandSkill[]
}

export const unknownHistory: RedFlagHistory = {
  ageMonths: null,
  firstPreferenceMonths: null,
  preferenceConsistent: null,
  gestationWeeks: null,
  handChanged: null,
  handMayHaveChanged: null,
  askedToSwitch: null,
  newWeakness: null,
  numbness: null,
  faceDroop: null,
  newHeadache: null,
  seizure: null,
  armInjury: null,
  walkChanged: null,
  otherHandHardlyUsed: null,
  otherHandFisted: null,
  dropsThings: null,
  weakerSide: null,
  lostSkill: null,
  tremor: null,
  tremorSudden: null,
  otherNeurologicalSigns: null,
  satInTime: null,
  walkedInTime: null,
  swapsWithinTask: null,
  wideMotorDifficulty: null,
  painAfter: null,
  punishedForHand: null,
  notBroughtInSixMonths: null,
  writingHand: null,
  skills: [],
}
