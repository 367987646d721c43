import { attainmentChange, goalWeight, type AttainmentChange } from './goalAttainment.ts'
import type { GoalDetails, GoalOutcome } from './goals.ts'

interface RatedGoal {
  details: Pick<GoalDetails, 'baseline' | 'importance' | 'difficulty'>
  latestLevel: number | null
  outcome: GoalOutcome | null
}

/**
 * T at the start and now over a child's goals, open and finished. A goal that was set aside is no longer worked
 * towards and counts at neither time (clinic rule).
 */
export const goalScores = (goals: readonly RatedGoal[]): AttainmentChange =>
  attainmentChange(
    goals
      .filter(({ outcome }) => outcome !== 'set_aside')
      .map(({ details, latestLevel }) => ({
        weight: goalWeight(details.importance, details.difficulty),
        baseline: details.baseline,
        followUp: latestLevel,
      })),
  )
