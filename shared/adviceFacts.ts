import type { ReferralConcern, ScriptDirection } from './referrals.ts'
import type { WritingHand } from './children.ts'
import type { SmudgeLevel } from './handwriting.ts'
import type { DeskType, Grip, LightSide, Pressure, Steadying, WristPosture } from './writingObservations.ts'

/** The therapist's conclusion on hand preference, as far as there is one. */
export const handPreferences = [
  'left_settled',
  'right_settled',
  'left_emerging',
  'right_emerging',
  'mixed_steady_by_task',
  'swaps_within_task',
  'possibly_switched',
  'unclear',
] as const
export type HandPreference = (typeof handPreferences)[number]

/** What a goal is about, as far as advice depends on it. */
export const goalTopics = [
  'handwriting',
  'speed',
  'pain',
  'scissors',
  'dressing',
  'kitchen',
  'computer',
] as const
export type GoalTopic = (typeof goalTopics)[number]

export const cuttingStages = ['starting', 'jagged', 'steady'] as const
export type CuttingStage = (typeof cuttingStages)[number]

export const writingStages = ['first_strokes', 'learning_letters', 'writing'] as const
export type WritingStage = (typeof writingStages)[number]

/**
 * What the record knows when advice is chosen. Null is "not known", never "no": an unknown fact offers nothing.
 * Centimetres, degrees and millimetres as in writingObservations.ts; minus is left, clockwise is plus.
 */
export interface AdviceFacts {
  ageMonths: number | null
  writingHand: WritingHand | null
  cuttingHand: WritingHand | null
  /** Without it no advice on letters that run left to right is offered: the page is set up differently. */
  scriptDirection: ScriptDirection | null
  handPreference: HandPreference | null
  swapsWithinTask: boolean | null
  sidesCrossed: boolean | null
  crossesMidlineLittle: boolean | null
  askedToSwitch: boolean | null
  /** Empty when none is recorded. */
  concerns: readonly ReferralConcern[]
  goalTopics: readonly GoalTopic[]

  paperOffsetCm: number | null
  paperTiltDegrees: number | null
  otherHandSteadies: Steadying | null
  wristPosture: WristPosture | null
  /** Minus is bent inwards. */
  wristExtensionDegrees: number | null
  wristBendsLowOnPage: boolean | null
  grip: Grip | null
  fingerToTipMm: number | null
  pressure: Pressure | null
  /** 0 to 10 after ten minutes of writing. */
  painAfter: number | null
  smudge: SmudgeLevel | null
  paperTears: boolean | null
  reversals: number | null
  mirrorWords: boolean | null
  startsAtRight: boolean | null
  crossStrokeTrouble: boolean | null
  slantRemarked: boolean | null
  writingStage: WritingStage | null
  copyingSlow: boolean | null
  handCoversModel: boolean | null
  legiblePercent: number | null
  lettersPerMinute: number | null
  /** The therapist's judgement against a table the clinic has entered; no norm is built in. */
  speedMeasuredLow: boolean | null

  cuttingStage: CuttingStage | null
  sharesScissorPot: boolean | null
  rulerTrouble: boolean | null
  sharpenerTrouble: boolean | null
  ringsUnderArm: boolean | null
  usesWipeBoard: boolean | null
  usesMouse: boolean | null

  deskType: DeskType | null
  /** Side of a chair's writing tablet. */
  tabletSide: 'left' | 'right' | null
  /** Which seat of a shared desk, as the pupil faces the board. */
  seatSide: 'left' | 'right' | null
  elbowClash: boolean | null
  leftClearanceCm: number | null
  lightSide: LightSide | null
  feetFlat: boolean | null
  deskAboveElbowCm: number | null
  boardAngleDegrees: number | null
  slumps: boolean | null
  leftHandersGrouped: boolean | null
  examWithinThreeMonths: boolean | null
}

/** A record that knows nothing yet: spread what is known over it. */
export const unknownFacts: AdviceFacts = {
  ageMonths: null,
  writingHand: null,
  cuttingHand: null,
  scriptDirection: null,
  handPreference: null,
  swapsWithinTask: null,
  sidesCrossed: null,
  crossesMidlineLittle: null,
  askedToSwitch: null,
  concerns: [],
  goalTopics: [],
  paperOffsetCm: null,
  paperTiltDegrees: null,
  otherHandSteadies: null,
  wristPosture: null,
  wristExtensionDegrees: null,
  wristBendsLowOnPage: null,
  grip: null,
  fingerToTipMm: null,
  pressure: null,
  painAfter: null,
  smudge: null,
  paperTears: null,
  reversals: null,
  mirrorWords: null,
  startsAtRight: null,
  crossStrokeTrouble: null,
  slantRemarked: null,
  writingStage: null,
  copyingSlow: null,
  handCoversModel: null,
  legiblePercent: null,
  lettersPerMinute: null,
  speedMeasuredLow: null,
  cuttingStage: null,
  sharesScissorPot: null,
  rulerTrouble: null,
  sharpenerTrouble: null,
  ringsUnderArm: null,
  usesWipeBoard: null,
  usesMouse: null,
  deskType: null,
  tabletSide: null,
  seatSide: null,
  elbowClash: null,
  leftClearanceCm: null,
  lightSide: null,
  feetFlat: null,
  deskAboveElbowCm: null,
  boardAngleDegrees: null,
  slumps: null,
  leftHandersGrouped: null,
  examWithinThreeMonths: null,
}

/** Above the line, settled, readable and without pain: a hand that needs no change. Unknown pain or legibility is no. */
export const writesWellAboveLine = (facts: AdviceFacts): boolean =>
  facts.wristPosture === 'above_line' &&
  facts.painAfter === 0 &&
  facts.legiblePercent !== null &&
  facts.legiblePercent >= 90 &&
  facts.ageMonths !== null &&
  facts.ageMonths >= 96
