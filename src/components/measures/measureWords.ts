import { formatQuotient } from '@shared/laterality.ts'
import {
  reachPlaces,
  type EyeAction,
  type Interval,
  type MeasureKind,
  type MeasureScore,
  type MeasureView,
  type ReachPlace,
  type SeatingScore,
  type Side,
  type SidesScore,
  type SkillKind,
  type SkillScore,
} from '@shared/measures.ts'
import type { Hand } from '@shared/roles.ts'

/** Places of the arc from the child's side. */
export const placeWords: Record<ReachPlace, string> = {
  1: 'Far left',
  2: 'Left',
  3: 'Near left',
  4: 'Midline',
  5: 'Near right',
  6: 'Right',
  7: 'Far right',
}
export const places = reachPlaces.map((place) => ({ place, words: placeWords[place] }))

export const handWords: Record<Hand, string> = { left: 'Left', right: 'Right' }
export const sideWords: Record<Side, string> = { left: 'Left', right: 'Right', mixed: 'Mixed' }

export const eyeWords: Record<EyeAction, string> = {
  far: 'Looks through a hole, far target',
  near: 'Looks through a hole, near target',
}

export const isSkill = (kind: MeasureKind): kind is SkillKind =>
  kind === 'pegs' || kind === 'tapping' || kind === 'dots'

const plural = (count: number, one: string, many: string) => `${count} ${count === 1 ? one : many}`

/** A trial's value with its unit: '12.3 s', '84 taps', '41 dots'. */
export function trialWords(kind: SkillKind, value: number): string {
  if (kind === 'pegs') return `${value.toFixed(1)} s`
  return kind === 'tapping' ? plural(value, 'tap', 'taps') : plural(value, 'dot', 'dots')
}

/** A figure of several trials, to a tenth of its unit. */
export const figureWords = (kind: SkillKind, value: number): string =>
  `${value.toFixed(1)} ${{ pegs: 's', tapping: 'taps', dots: 'dots' }[kind]}`

/** '11.8 to 13.2', both with the given number of decimals. */
export const rangeWords = ({ low, high }: Interval, decimals = 1): string =>
  `${low.toFixed(decimals).replace('-', '−')} to ${high.toFixed(decimals).replace('-', '−')}`

const noClearDifference = 'no clear difference'

/**
 * Which hand did better, in words that fit the task; the sign alone is easily misread. No hand is named where the interval
 * of the index reaches zero.
 */
export function betterHand({ kind, interval }: Pick<SkillScore, 'kind' | 'interval'>, index: number): string {
  if (interval !== null && interval.low <= 0 && interval.high >= 0) return noClearDifference
  if (index === 0) return 'both hands alike'
  const hand = index < 0 ? 'left' : 'right'
  return kind === 'pegs' ? `${hand} faster` : `${hand} did more`
}

const reachingHeadline = (score: Extract<MeasureScore, { kind: 'reaching' }>) => {
  if (score.index === null) return 'no reach counted yet'
  const counts = `${score.left} left, ${score.right} right`
  return score.lost > 0 ? `${counts}, ${score.lost} lost` : counts
}
const skillHeadline = (score: SkillScore) => {
  if (score.index === null)
    return `${plural(score.left.trials, 'trial', 'trials')} left, ${score.right.trials} right`
  const words = betterHand(score, score.index)
  const value = formatQuotient(score.index)
  return words === noClearDifference ? `${words} (${value})` : `${words}, ${value}`
}

const sidesHeadline = ({ foot, eyeFar, ear }: SidesScore) => {
  const parts = [
    foot.answered > 0 ? `foot ${foot.side}` : null,
    eyeFar.answered > 0 ? `eye ${eyeFar.side}` : null,
    ear.answered > 0 ? `ear ${ear.side}` : null,
  ].filter((part) => part !== null)
  return parts.length > 0 ? parts.join(', ') : 'nothing recorded yet'
}

/** What to do to a height or a depth, in cm; null where it cannot be told. */
export function changeWords(change: number | null, more = 'higher', less = 'lower'): string | null {
  if (change === null) return null
  if (change === 0) return 'inside its range'
  return `${Math.abs(change).toFixed(1)} cm ${change > 0 ? more : less}`
}

export const markWords = (marks: number[]): string => {
  if (marks.length === 0) return 'outside the table of size marks'
  return marks.length === 1 ? `size mark ${marks[0]}` : `size mark ${marks.join(' or ')}`
}
const seatingHeadline = ({ marks, seatChange, deskChange }: SeatingScore) => {
  const seat = changeWords(seatChange)
  const desk = changeWords(deskChange)
  const parts = [
    marks === null ? null : markWords(marks),
    seat === null ? null : `seat ${seat}`,
    desk === null ? null : `desk ${desk}`,
  ].filter((part) => part !== null)
  return parts.length > 0 ? parts.join(', ') : 'not enough measured yet'
}

const scoreHeadline = (score: MeasureScore): string => {
  switch (score.kind) {
    case 'reaching':
      return reachingHeadline(score)
    case 'sides':
      return sidesHeadline(score)
    case 'seating':
      return seatingHeadline(score)
    default:
      return skillHeadline(score)
  }
}

/** The figure of a measure for a list, in words; counts rather than a label where no bands are published. */
export const measureHeadline = ({ score, notDoneReason }: MeasureView): string =>
  notDoneReason === null ? scoreHeadline(score) : `not done: ${notDoneReason}`
