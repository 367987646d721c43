import { goalScores } from '../../shared/goalScores.ts'
import type { GoalsView, GoalView } from '../../shared/goals.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { canCreateGoal, canWorkOnGoal } from '../policies/goals.ts'
import type { GoalRecord } from '../queries/goals.ts'

export const presentGoal = (goal: GoalRecord, access: ChildAccess): GoalView => ({
  id: goal.id,
  activity: goal.details.activity,
  childVoice: goal.details.childVoice,
  levels: goal.details.levels,
  baseline: goal.details.baseline,
  importance: goal.details.importance,
  difficulty: goal.details.difficulty,
  targetOn: goal.details.targetOn,
  setOn: goal.setOn,
  ratings: goal.ratings.map(({ level, ratedOn, by, note }) => ({ level, ratedOn, by, note })),
  latestLevel: goal.latestLevel,
  endedOn: goal.endedOn,
  outcome: goal.outcome,
  endReason: goal.endReason,
  version: goal.version,
  can: { change: canWorkOnGoal(access, goal), rate: canWorkOnGoal(access, goal) },
})

export const presentGoals = (goals: readonly GoalRecord[], access: ChildAccess): GoalsView => {
  const { baselineT, followUpT, scored } = goalScores(goals)
  return {
    goals: goals.map((goal) => presentGoal(goal, access)),
    baselineScore: baselineT,
    score: followUpT,
    scored,
    can: { add: canCreateGoal(access) },
  }
}
