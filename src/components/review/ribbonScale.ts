import type { WaitingBar } from '@shared/review.ts'

/** Where one referral's bar lies, in pixels from the left of the drawing. Every bar ends at today, on the right. */
export interface RibbonBar {
  /** Left end of the bar: the referral's date. */
  start: number
  /** Where the target lies for this referral, whether the bar reaches it or not. */
  target: number
  over: boolean
}

export interface RibbonScale {
  /** Right end of every bar. */
  today: number
  ticks: { x: number; weeks: number }[]
  bars: RibbonBar[]
}

const daysPerWeek = 7
const tickSteps = [1, 2, 4, 6, 8, 12, 26, 52]
const mostTicks = 7

/** Weeks with one decimal, as the wait is shown everywhere on the page: 137 days are 19.6. */
export const weeksOf = (days: number): string => (days / daysPerWeek).toFixed(1)

/** How a wait stands against its target. */
export const targetWords = ({ days, targetDays }: WaitingBar): string =>
  days > targetDays
    ? `${weeksOf(days - targetDays)} weeks over the target`
    : `${weeksOf(targetDays - days)} weeks left before the target`

/** Longest wait first; the same wait in order of name, so that the picture does not shift between two looks. */
export const longestFirst = (bars: readonly WaitingBar[]): WaitingBar[] =>
  [...bars].sort((a, b) => b.days - a.days || a.name.localeCompare(b.name))

/**
 * Lays the bars between `left` and `right` pixels on one time axis that ends today. The axis always reaches past the
 * furthest target, so that a short list still shows how far away the target is.
 */
export function ribbonScale(bars: readonly WaitingBar[], left: number, right: number): RibbonScale {
  const furthest = Math.max(daysPerWeek, ...bars.flatMap((bar) => [bar.days, bar.targetDays]))
  const span = furthest * 1.06
  const xOf = (days: number) => right - ((right - left) * Math.min(days, span)) / span
  const weeks = span / daysPerWeek
  const step = tickSteps.find((candidate) => weeks / candidate <= mostTicks) ?? Math.ceil(weeks / mostTicks)
  const ticks = Array.from({ length: Math.floor(weeks / step) + 1 }, (_, index) => ({
    weeks: index * step,
    x: xOf(index * step * daysPerWeek),
  }))
  return {
    today: right,
    ticks,
    bars: bars.map((bar) => ({
      start: xOf(bar.days),
      target: xOf(bar.targetDays),
      over: bar.days > bar.targetDays,
    })),
  }
}
