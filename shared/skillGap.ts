import type { Hand } from './roles.ts'

/** One task timed or counted with each hand. */
export interface HandSkill {
  /** Name of the task, for people. */
  task: string
  /** −100 … +100; minus means that the left hand did better. Null when it could not be worked out. */
  index: number | null
  /** Interval of the index; null when there were too few trials for one. */
  interval: { low: number; high: number } | null
}

/**
 * Tasks in which the hand that does not write clearly did better: the whole interval of the index lies on its side.
 * A gap without an interval is not called clear, and a child who swaps has no hand to compare with.
 */
export function skillGapAgainst(writingHand: Hand | null, skills: readonly HandSkill[]): string[] {
  if (writingHand === null) return []
  return skills
    .filter(({ index, interval }) => {
      if (index === null || interval === null) return false
      return writingHand === 'left' ? interval.low > 0 : interval.high < 0
    })
    .map(({ task }) => task)
}
