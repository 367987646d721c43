import type { Attention } from './attention.ts'
import { daysBetween, type Day } from './days.ts'
import type { EpisodeState } from './episodes.ts'

/** The wait runs from the day a referral was received until the assessment begins. */
export const waitingStates: readonly EpisodeState[] = ['referred', 'triaged', 'waiting', 'consented']

/** Days before the target in which a wait is shown as coming close (clinic rule). */
export const waitNoticeDays = 14

/** Days waited so far; days on which the wait was paused do not count. */
export const waitDays = (receivedOn: Day, today: Day, pausedDays = 0): number =>
  daysBetween(receivedOn, today) - pausedDays

/** Over the target is overdue, the last two weeks before it are soon; earlier waits need no mark. */
export function waitLevel(days: number, targetWeeks: number): Attention | null {
  const target = targetWeeks * 7
  if (days > target) return 'overdue'
  return days >= target - waitNoticeDays ? 'soon' : null
}

export interface WaitSummary {
  median: number | null
  /** The wait that nine of ten do not pass: nearest rank, so it is always somebody's real wait. */
  p90: number | null
  longest: number | null
  n: number
}

/** Median, 90th percentile and longest of some waits in days; null when nobody waits, since 0 would read as no wait. */
export function summariseWaits(days: readonly number[]): WaitSummary {
  const sorted = days.toSorted((a, b) => a - b)
  const n = sorted.length
  const at = (rank: number) => sorted[rank - 1] ?? null
  const low = at(Math.floor((n + 1) / 2))
  const high = at(Math.ceil((n + 1) / 2))
  return {
    median: low === null || high === null ? null : (low + high) / 2,
    p90: at(Math.ceil((9 * n) / 10)),
    longest: at(n),
    n,
  }
}
