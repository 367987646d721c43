import { compareDays, daysBetween, type Day } from './days.ts'

/** One value of a series over time. */
export interface DatedValue {
  on: Day
  value: number
}

/** Days since the first day of the series, in order of time. */
export function dayPoints(series: readonly DatedValue[]): { x: number; y: number }[] {
  const ordered = series.toSorted((a, b) => compareDays(a.on, b.on))
  const [first] = ordered
  return first ? ordered.map(({ on, value }) => ({ x: daysBetween(first.on, on), y: value })) : []
}

/** Clinic rule: a slope over fewer than three different days is none. */
export const leastDays = 3
