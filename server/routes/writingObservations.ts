import { Router } from 'express'
import { writingObservationSchema } from '../../shared/writingObservations.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { writingObservationPolicies } from '../policies/writingObservations.ts'
import { presentObservation } from '../presenters/writingObservations.ts'
import { findObservation, listObservations } from '../queries/writingObservations.ts'
import { recordChildRead } from '../services/audit.ts'
import { addObservation } from '../services/writingObservations.ts'

const base = '/children/:childId/writing-observations'

export const writingObservationRoutes = (): Router => {
  const router = Router()

  router.get(base, allow(writingObservationPolicies.list), async (req, res) => {
    const observations = await listObservations(accessOf(req))
    await recordChildRead(req.actor, accessOf(req), 'writingObservations.list', {
      detail: { ids: observations.map((observation) => observation.id) },
    })
    res.json(observations.map(presentObservation))
  })

  router.post(base, allow(writingObservationPolicies.add), async (req, res) => {
    const details = await bodyOf(req, writingObservationSchema)
    const id = await addObservation(req.actor, accessOf(req), details, idempotencyKeyOf(req))
    res.status(201).json(presentObservation(await findObservation(accessOf(req), id)))
  })

  return router
}
