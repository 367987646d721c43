import { dayPoints, leastDays, type DatedValue } from './datedValues.ts'

/** Middle value; the mean of the two middle ones of an even number. Null for none. */
export function median(values: readonly number[]): number | null {
  const ordered = values.toSorted((a, b) => a - b)
  const upper = ordered[Math.floor(ordered.length / 2)]
  const lower = ordered[Math.ceil(ordered.length / 2) - 1]
  return upper === undefined || lower === undefined ? null : (lower + upper) / 2
}

/** Median of the slopes of all pairs of points; pairs at the same x are skipped. Null without a usable pair. */
export function medianSlope(points: readonly { x: number; y: number }[]): number | null {
  return median(
    points.flatMap((later, index) =>
      points
        .slice(0, index)
        .filter((earlier) => earlier.x !== later.x)
        .map((earlier) => (later.y - earlier.y) / (later.x - earlier.x)),
    ),
  )
}

/**
 * Theil-Sen slope per day, from real dates and not from row numbers. Null with fewer than three different days.
 * Theil 1950; Sen 1968, J Am Stat Assoc 63:1379-1389. One odd session moves it little.
 */
export function theilSenSlope(series: readonly DatedValue[]): number | null {
  return new Set(series.map(({ on }) => on)).size < leastDays ? null : medianSlope(dayPoints(series))
}
