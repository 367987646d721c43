import { leastTrials } from './handSkill.ts'
import type { SkillKind } from './measures.ts'
import type { Hand } from './roles.ts'

/** One task timed or counted with each hand. */
export interface HandSkill {
  kind: SkillKind
  /** Name of the task, for people. */
  task: string
  /** Counted trials of the hand that has fewer. */
  trials: number
  /** −100 … +100; minus means that the left hand did better. Null when it could not be worked out. */
  index: number | null
  /** Interval of the index; null when there were too few trials for one. */
  interval: { low: number; high: number } | null
}

/**
 * Tasks in which the hand that does not write clearly did better: the whole interval of the index lies on its side, on
 * three trials a hand or more. Pegs may stand alone. Tapping predicts preference poorly (Njiokiktjien et al. 1997) and
 * children do not fall into two groups on dots (conference abstract, n 274, ages 4 to 18), so either counts only where
 * another task agrees. A gap without an interval is not called clear, and a child who swaps has no hand to compare with.
 */
export function skillGapAgainst(writingHand: Hand | null, skills: readonly HandSkill[]): string[] {
  if (writingHand === null) return []
  const clear = skills.filter(({ trials, index, interval }) => {
    if (trials < leastTrials || index === null || interval === null) return false
    return writingHand === 'left' ? interval.low > 0 : interval.high < 0
  })
  const kinds = new Set(clear.map(({ kind }) => kind))
  return kinds.has('pegs') || kinds.size > 1 ? clear.map(({ task }) => task) : []
}
