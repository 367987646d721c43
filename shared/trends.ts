import type { DatedValue } from './datedValues.ts'
import { compareDays, type Day } from './days.ts'
import { leastSquaresSlope } from './leastSquares.ts'
import { mannKendall } from './mannKendall.ts'
import type { LockedMeasure } from './measureRows.ts'
import { measureKindLabels, type MeasureDetails, type MeasureKind, type SkillScore } from './measures.ts'
import { theilSenSlope } from './theilSen.ts'

/** How a figure went over at least three different days. A description of one child, never a test of a treatment. */
export interface MeasureTrend {
  kind: MeasureKind
  title: string
  /** E.g. 'Left hand, mean seconds'. */
  label: string
  occasions: number
  from: Day
  to: Day
  /** Theil-Sen slope for 30 days, in the unit of the figure. */
  per30Days: number
  /** Least-squares slope for 30 days with its 95 % interval by Student's t, a second view. */
  leastSquares: { per30Days: number; interval: { low: number; high: number } | null }
  /** Mann-Kendall, two-sided; null when every value is the same. */
  p: number | null
  words: string
}

export const trendCaution =
  'Occasions of one child are not independent and practice makes quicker: read this as a description.'

const days = 30

const signed = (value: number) => `${value < 0 ? '−' : value > 0 ? '+' : ''}${Math.abs(value).toFixed(1)}`

function trendOf(kind: MeasureKind, label: string, series: readonly DatedValue[]): MeasureTrend | null {
  const ordered = series.toSorted((a, b) => compareDays(a.on, b.on))
  const [first, last] = [ordered[0], ordered.at(-1)]
  const slope = theilSenSlope(ordered)
  const line = leastSquaresSlope(ordered)
  if (!first || !last || slope === null || line === null) return null
  const { pTwoSided, method } = mannKendall(ordered.map(({ value }) => value))
  const interval = line.interval && { low: days * line.interval.low, high: days * line.interval.high }
  return {
    kind,
    title: measureKindLabels[kind],
    label,
    occasions: ordered.length,
    from: first.on,
    to: last.on,
    per30Days: days * slope,
    leastSquares: { per30Days: days * line.slope, interval },
    p: pTwoSided,
    words:
      `${signed(days * slope)} in 30 days (median of slopes, Theil-Sen)` +
      (interval
        ? `; least squares ${signed(days * line.slope)}, 95 % interval ${signed(interval.low)} to ${signed(interval.high)}`
        : '') +
      (pTwoSided === null
        ? ''
        : `; Mann-Kendall p ${pTwoSided < 0.001 ? 'below .001' : pTwoSided.toFixed(3).replace(/^0/, '')}` +
          (method === 'exact' ? ' (exact)' : '')),
  }
}

const wayOf = (details: MeasureDetails): number | null => {
  switch (details.kind) {
    case 'reaching':
      return details.cardsPerPlace
    case 'pegs':
      return details.pegs
    case 'tapping':
    case 'dots':
      return details.seconds
    case 'sides':
      return details.eyeFarMetres
    case 'seating':
      return null
  }
}

/** Two measures of one kind with the same cards, pegs, seconds or far distance: only then are their figures alike. */
export const isTakenAlike = (one: MeasureDetails, other: MeasureDetails): boolean =>
  wayOf(one) === wayOf(other)

const isSkill = (score: LockedMeasure['score']): score is SkillScore => 'unit' in score

/**
 * Trends of each hand's mean in pegs, tapping and dots, wherever it was taken on three different days or more in the way
 * of the newest: a longer trial counts more taps, and that is no gain.
 */
export function skillTrends(measures: readonly LockedMeasure[]): MeasureTrend[] {
  const kinds = [...new Set(measures.map(({ details }) => details.kind))]
  return kinds.flatMap((kind) =>
    (['left', 'right'] as const).flatMap((hand) => {
      const done = measures.flatMap(({ score, details, measuredOn, notDoneReason }) =>
        score.kind === kind && isSkill(score) && notDoneReason === null
          ? [{ score, details, measuredOn }]
          : [],
      )
      const newest = done.toSorted((a, b) => compareDays(b.measuredOn, a.measuredOn))[0]
      const taken = done.filter(({ details }) => newest && isTakenAlike(details, newest.details))
      const series = taken.flatMap(({ score, measuredOn }) => {
        const { mean } = score[hand]
        return mean === null ? [] : [{ on: measuredOn, value: mean }]
      })
      const unit = taken[0]?.score.unit === 'seconds' ? 'mean seconds' : 'mean count'
      return trendOf(kind, `${hand === 'left' ? 'Left' : 'Right'} hand, ${unit}`, series) ?? []
    }),
  )
}
