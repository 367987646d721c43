import { Router, type Request } from 'express'
import { goalEndSchema, goalRatingSchema, goalSchema } from '../../shared/goals.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, ifMatchOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { goalPolicies } from '../policies/goals.ts'
import { presentGoal, presentGoals } from '../presenters/goals.ts'
import { findGoal, listGoals } from '../queries/goals.ts'
import { recordChildRead } from '../services/audit.ts'
import { createGoal, endGoal, rateGoal } from '../services/goals.ts'
import { answerStale } from '../services/versions.ts'

const base = '/children/:childId/goals'

const idOf = (req: Request) => String(req.params.goalId)

const view = async (req: Request, id: string) => presentGoal(await findGoal(accessOf(req), id), accessOf(req))

export const goalRoutes = (): Router => {
  const router = Router()

  router.get(base, allow(goalPolicies.list), async (req, res) => {
    const goals = await listGoals(accessOf(req))
    await recordChildRead(req.actor, accessOf(req), 'goals.list', {
      detail: { ids: goals.map((goal) => goal.id) },
    })
    res.json(presentGoals(goals, accessOf(req)))
  })

  router.post(base, allow(goalPolicies.create), async (req, res) => {
    const details = await bodyOf(req, goalSchema)
    const id = await createGoal(req.actor, accessOf(req), details, idempotencyKeyOf(req))
    res.status(201).json(await view(req, id))
  })

  router.post(`${base}/:goalId/ratings`, allow(goalPolicies.rate), async (req, res) => {
    const rating = await bodyOf(req, goalRatingSchema)
    await rateGoal(req.actor, accessOf(req), idOf(req), rating, idempotencyKeyOf(req))
    res.status(201).json(await view(req, idOf(req)))
  })

  // A goal ends once and for all, so the version is checked only when the caller states one.
  router.post(`${base}/:goalId/end`, allow(goalPolicies.end), async (req, res) => {
    const version = req.get('If-Match') === undefined ? null : ifMatchOf(req)
    const ending = await bodyOf(req, goalEndSchema)
    await answerStale(endGoal(req.actor, accessOf(req), idOf(req), version, ending), async () => {
      const goal = await view(req, idOf(req))
      await recordChildRead(req.actor, accessOf(req), 'goal.read', { objectType: 'goal', objectId: goal.id })
      return goal
    })
    res.status(204).end()
  })

  return router
}
