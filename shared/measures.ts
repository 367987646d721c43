import type { Day } from './days.ts'
import type { Hand } from './roles.ts'

/*
 * The words of measures. Input schemas stand in measureSchemas.ts, scores in measureScores.ts (scoreMeasure,
 * emptyDetails, lockProblems) and in the file of each method: reaching.ts, handSkill.ts, sides.ts, seatingFit.ts.
 */

/** Measures a therapist takes with the child. */
export const measureKinds = ['reaching', 'pegs', 'tapping', 'dots', 'sides', 'seating'] as const
export type MeasureKind = (typeof measureKinds)[number]
export const skillKinds = ['pegs', 'tapping', 'dots'] as const
export type SkillKind = (typeof skillKinds)[number]
export const measureKindLabels: Record<MeasureKind, string> = {
  reaching: 'Reaching across the midline',
  pegs: 'Moving pegs',
  tapping: 'Tapping',
  dots: 'Dots in circles',
  sides: 'Foot, eye and ear',
  seating: 'Seating measurements',
}

/** 1 is the child's far left, 4 the midline, 7 the far right. */
export const reachPlaces = [1, 2, 3, 4, 5, 6, 7] as const
export type ReachPlace = (typeof reachPlaces)[number]

export interface Reach {
  place: ReachPlace
  /** Null is a lost reach: nobody saw it, or the card fell. */
  hand: Hand | null
  /** The card changed hands on the way; `hand` is the one that took it first, so a lost reach is never swapped. */
  swapped: boolean
}

export interface ReachingDetails {
  kind: 'reaching'
  cardsPerPlace: 3 | 6
  /** Unsigned 32-bit; with the number of cards it fixes the order of places. */
  seed: number
  /** In the order of the seed; shorter than the order while under way. */
  reaches: Reach[]
}

export interface SkillTrial {
  hand: Hand
  /** Seconds (pegs) or a count (tapping, dots). Null while not taken. */
  value: number | null
  /** Marked by the therapist; kept, and left out of every figure. */
  interrupted: boolean
  /** An unlikely value that the therapist was asked about and kept. */
  confirmed: boolean
}

export interface SkillDetails {
  kind: SkillKind
  startHand: Hand
  /** Pegs moved in one trial; null for counts. */
  pegs: number | null
  /** Length of one trial in seconds; null for pegs. */
  seconds: number | null
  trials: SkillTrial[]
}

export const sides = ['left', 'right', 'mixed'] as const
export type Side = (typeof sides)[number]
export const footActions = ['kick', 'hop', 'step_up', 'pebble'] as const
export type FootAction = (typeof footActions)[number]
export const eyeActions = ['far', 'near'] as const
export type EyeAction = (typeof eyeActions)[number]
export const earActions = ['listen', 'phone'] as const
export type EarAction = (typeof earActions)[number]
/** Three tries; null is "not done". */
export type Tries = [Side | null, Side | null, Side | null]

export interface SidesDetails {
  kind: 'sides'
  foot: Record<FootAction, Tries>
  eye: Record<EyeAction, Tries>
  /** Distance of the far target in metres; agreement between distances is poor, so it is fixed and kept. */
  eyeFarMetres: number | null
  ear: Record<EarAction, Tries>
}

export interface SeatingDetails {
  kind: 'seating'
  poplitealCm: number | null
  statureCm: number | null
  /** Added to the popliteal height when it was measured without shoes; null when measured in shoes. */
  shoeCm: number | null
  seatHeightCm: number | null
  seatDepthCm: number | null
  buttockPoplitealCm: number | null
  elbowHeightCm: number | null
  shoulderHeightCm: number | null
  deskHeightCm: number | null
  feetFlat: 'yes' | 'no' | null
  leftClearanceCm: number | null
  neighbourHand: Hand | null
  lightSide: 'left' | 'right' | 'front' | 'behind' | 'above' | null
}

export type MeasureDetails = ReachingDetails | SkillDetails | SidesDetails | SeatingDetails

export interface Interval {
  low: number
  high: number
}

export interface ReachingScore {
  kind: 'reaching'
  left: number
  right: number
  lost: number
  swapped: number
  /** 100 (R − L)/(R + L); null when nothing was counted. */
  index: number | null
  /** Counts of the index within which the choice of hand is not beyond chance (two-sided exact sign test, 5 %). */
  chance: Interval | null
  pTwoSided: number | null
  /** The hand used more often; null when neither. */
  preferred: Hand | null
  /** Reaches of the preferred hand into the far side, the near side and the middle, of those counted there. */
  crossing: { count: number; of: number } | null
  nearSide: { count: number; of: number } | null
  midline: { count: number; of: number } | null
  places: { place: ReachPlace; left: number; right: number; lost: number }[]
}

export interface HandSummary {
  trials: number
  mean: number | null
  /** Standard deviation of the trials (n − 1); null with fewer than two. */
  sd: number | null
  /** 95 % interval of the mean by Student's t; null with fewer than two trials and when none differs. */
  interval: Interval | null
}

export interface SkillScore {
  kind: SkillKind
  unit: 'seconds' | 'count'
  left: HandSummary
  right: HandSummary
  interrupted: number
  /** Positive when the right hand is better, for times as for counts; null when a hand has no trial. */
  index: number | null
  /** Approximate 95 % interval of the index; null with fewer than two trials a hand and when none differs. */
  interval: Interval | null
}

export interface SideSummary {
  /** Sum of the actions, right +1, left −1, mixed 0. */
  sum: number
  answered: number
  side: Side | null
  /** 100 × sum / answered, for the lateral line; null when nothing was answered. */
  index: number | null
}

export interface SidesScore {
  kind: 'sides'
  foot: SideSummary
  eyeFar: SideSummary
  eyeNear: SideSummary
  ear: SideSummary
}

export interface SeatingScore {
  kind: 'seating'
  /** EN 1729-1 size marks that fit; two when the measure allows both, empty when none. Null when not measured. */
  marks: number[] | null
  marksFrom: 'popliteal' | 'stature' | null
  /** Ranges in cm by the match equations; null when a measure is missing. */
  seatRange: Interval | null
  depthRange: Interval | null
  deskRange: Interval | null
  /** What to change in cm, plus is higher or longer; 0 when it fits; null when it cannot be told. */
  seatChange: number | null
  depthChange: number | null
  deskChange: number | null
}

export type MeasureScore = ReachingScore | SkillScore | SidesScore | SeatingScore

export interface MeasureView {
  id: string
  childId: string
  kind: MeasureKind
  methodVersion: string
  measuredOn: Day
  details: MeasureDetails
  /** As stored when locked; until then computed from the trials at hand. */
  score: MeasureScore
  notDoneReason: string | null
  comment: string | null
  startedBy: string
  lockedAt: string | null
  lockedBy: string | null
  replacesId: string | null
  replacedById: string | null
  version: number
  can: { change: boolean; lock: boolean; replace: boolean }
}
