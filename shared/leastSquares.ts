import { dayPoints, leastDays, type DatedValue } from './datedValues.ts'
import { studentTFactor } from './studentT.ts'

export interface LeastSquaresLine {
  slope: number
  /** Height at x = 0. */
  intercept: number
  /** Standard error of the slope and its 95 % interval by Student's t; null with two points, where nothing is left over. */
  error: number | null
  interval: { low: number; high: number } | null
}

/** Ordinary least-squares line. Null with fewer than two different x. */
export function leastSquaresLine(points: readonly { x: number; y: number }[]): LeastSquaresLine | null {
  const n = points.length
  const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / n
  const [middleX, middleY] = [mean(points.map(({ x }) => x)), mean(points.map(({ y }) => y))]
  const sum = (term: (x: number, y: number) => number) =>
    points.reduce((total, { x, y }) => total + term(x - middleX, y - middleY), 0)
  const spread = sum((x) => x * x)
  if (new Set(points.map(({ x }) => x)).size < 2) return null

  const slope = sum((x, y) => x * y) / spread
  const line = { slope, intercept: middleY - slope * middleX }
  if (n < 3) return { ...line, error: null, interval: null }
  const left = sum((x, y) => (y - slope * x) ** 2)
  const error = Math.sqrt(left / (n - 2) / spread)
  const reach = studentTFactor(n - 2) * error
  return { ...line, error, interval: { low: slope - reach, high: slope + reach } }
}

/**
 * Least-squares slope per day with its interval, a second view beside the Theil-Sen slope. Null with fewer than three
 * different days. Sessions of one child are not independent: a description, no proof.
 */
export const leastSquaresSlope = (series: readonly DatedValue[]): LeastSquaresLine | null =>
  new Set(series.map(({ on }) => on)).size < leastDays ? null : leastSquaresLine(dayPoints(series))
