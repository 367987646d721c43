import type { Day } from '../../shared/days.ts'
import type { GoalDetails, GoalOutcome } from '../../shared/goals.ts'
import { isId } from '../../shared/fields.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { notFound } from '../errors.ts'
import { within } from './scope.ts'
import { fromJson, selectRows } from './sql.ts'

interface StoredGoal {
  id: string
  details: string
  setOn: Day
  endedOn: Day | null
  outcome: GoalOutcome | null
  endReason: string | null
  version: number
}

interface StoredRating {
  goalId: string
  level: number
  ratedOn: Day
  by: string
  note: string | null
}

export interface GoalRecord extends Omit<StoredGoal, 'details'> {
  details: GoalDetails
  /** Oldest first. */
  ratings: Omit<StoredRating, 'goalId'>[]
  latestLevel: number | null
}

const listRatings = (access: ChildAccess): Promise<StoredRating[]> => {
  const scope = within(access, 'g.childId')
  return selectRows<StoredRating>(
    `SELECT r.goalId, r.level, r.ratedOn, u.displayName AS \`by\`, r.note
     FROM goal_ratings r JOIN goals g ON g.id = r.goalId JOIN users u ON u.id = r.ratedById
     WHERE ${scope.sql} ORDER BY r.ratedOn, r.createdAt, r.id`,
    scope.parameters,
  )
}

/** Goals of a child with their ratings: open ones first, then in the order they were set. */
export const listGoals = async (access: ChildAccess): Promise<GoalRecord[]> => {
  const scope = within(access, 'g.childId')
  const goals = await selectRows<StoredGoal>(
    `SELECT g.id, g.details, g.setOn, g.endedOn, g.outcome, g.endReason, g.version
     FROM goals g WHERE ${scope.sql} ORDER BY g.endedOn IS NOT NULL, g.setOn, g.createdAt, g.id`,
    scope.parameters,
  )
  const ratings = await listRatings(access)
  return goals.map((goal) => {
    const own = ratings.filter(({ goalId }) => goalId === goal.id)
    return {
      ...goal,
      details: fromJson<GoalDetails>(goal.details),
      ratings: own,
      latestLevel: own.at(-1)?.level ?? null,
    }
  })
}

export const findGoal = async (access: ChildAccess, id: string): Promise<GoalRecord> => {
  if (!isId(id)) throw notFound()
  const found = (await listGoals(access)).find((goal) => goal.id === id)
  if (!found) throw notFound()
  return found
}
