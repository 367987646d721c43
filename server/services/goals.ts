import { randomUUID } from 'node:crypto'
import { compareDays, formatDay } from '../../shared/days.ts'
import { goalTextProblems } from '../../shared/goalAttainment.ts'
import { mostOpenGoals, type GoalDetails, type GoalEnd, type GoalRating } from '../../shared/goals.ts'
import { targetDayProblem } from '../../shared/recordDays.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Goal } from '../entities/Goal.ts'
import { GoalRating as GoalRatingRow } from '../entities/GoalRating.ts'
import { conflict, invalid } from '../errors.ts'
import { findChildFacts } from '../queries/childFacts.ts'
import { lockChild } from '../queries/lockChild.ts'
import { findForChild } from '../queries/scope.ts'
import { count, selectOne } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { requireConsent, requirePastDay } from './recordRules.ts'
import { clinicToday, readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { updateIfCurrent } from './versions.ts'

const fact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action: `goal.${action}`,
  objectType: 'goal',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

const checkGoal = async (access: ChildAccess, goal: GoalDetails): Promise<void> => {
  const { writingHand } = await findChildFacts(access)
  const settledHand = writingHand === 'swaps' ? null : writingHand
  const problems = Object.fromEntries(
    goalTextProblems(goal.activity, goal.levels, goal.childVoice, settledHand).map(
      ({ field, level, message }) => [level === null ? field : `${field}[${level}]`, message],
    ),
  )
  const late = targetDayProblem('The target date', goal.targetOn, clinicToday(await readSettings()))
  if (late !== null) problems.targetOn = late
  if (Object.keys(problems).length > 0) throw invalid(problems)
}

/** Holds the child's row until the transaction ends, so that two goals set at once cannot both be the fourth. */
const checkRoom = async (tx: Tx, access: ChildAccess): Promise<void> => {
  await lockChild(access, tx)
  const open = await selectOne<{ open: string }>(
    'SELECT COUNT(*) AS open FROM goals g WHERE g.childId = :childId AND g.endedOn IS NULL LOCK IN SHARE MODE',
    { childId: access.childId },
    tx,
  )
  if (open && count(open.open) >= mostOpenGoals)
    throw conflict(
      'too_many_goals',
      `${mostOpenGoals} goals are open already. End one first: a few goals that matter are easier to reach.`,
    )
}

/**
 * Sets a goal. Refused (422 beside the fields) when it asks the child to change hands, when two levels say the same or
 * the child has no word in it. Answers its id.
 */
export const createGoal = async (
  actor: Actor,
  access: ChildAccess,
  details: GoalDetails,
  key: string | null,
): Promise<string> => {
  await checkGoal(access, details)
  const setOn = clinicToday(await readSettings())
  return transact(actor, (tx, record) => {
    const request = ['goal', access.childId, details]
    const factOf = (id: string) => fact(access, 'created', id)
    return createOnce(tx, actor, record, { key, request }, factOf, async (goalId) => {
      await requireConsent(tx, access, 'assessment_treatment')
      await checkRoom(tx, access)
      await tx.insert(Goal, {
        id: goalId,
        childId: access.childId,
        details,
        setOn,
        endedOn: null,
        outcome: null,
        endReason: null,
        setById: access.viewer.id,
        createdAt: now(),
      })
    })
  })
}

/** The goal for writing; an ended one refuses. */
const openGoal = async (tx: Tx, access: ChildAccess, id: string): Promise<Goal> => {
  const goal = await findForChild(access, Goal, id, tx, { lock: true })
  if (goal.endedOn !== null)
    throw conflict('closed', 'This goal has ended; its levels stay as they were rated.')
  return goal
}

/** Adds a level reached on one day. Earlier ratings are never changed. */
export const rateGoal = async (
  actor: Actor,
  access: ChildAccess,
  goalId: string,
  rating: GoalRating,
  key: string | null,
): Promise<void> => {
  await requirePastDay(access, 'ratedOn', 'The date', rating.ratedOn)
  await transact(actor, async (tx, record) => {
    const goal = await openGoal(tx, access, goalId)
    if (compareDays(rating.ratedOn, goal.setOn) < 0)
      throw invalid({ ratedOn: `The date cannot be before the goal was set (${formatDay(goal.setOn)})` })
    const request = ['goalRating', goalId, rating]
    const factOf = () => fact(access, 'rated', goalId)
    await createOnce(tx, actor, record, { key, request }, factOf, async () => {
      await tx.insert(GoalRatingRow, {
        id: randomUUID(),
        goalId,
        level: rating.level,
        ratedOn: rating.ratedOn,
        note: rating.note,
        ratedById: access.viewer.id,
        createdAt: now(),
      })
    })
  })
}

/** Ends a goal with how and why. With a version, throws StaleWrite when it is no longer the stored one. */
export const endGoal = async (
  actor: Actor,
  access: ChildAccess,
  goalId: string,
  version: number | null,
  { outcome, reason }: GoalEnd,
): Promise<void> => {
  const endedOn = clinicToday(await readSettings())
  await transact(actor, async (tx, record) => {
    const goal = await openGoal(tx, access, goalId)
    const patch = { endedOn, outcome, endReason: reason }
    await updateIfCurrent(tx, Goal, goalId, version ?? goal.version, patch)
    record({ ...fact(access, 'ended', goalId), detail: { outcome } })
  })
}
