import { Router } from 'express'
import { allow } from '../middleware/allow.ts'
import { viewerOf } from '../middleware/requestContext.ts'
import { therapistPolicies } from '../policies/therapists.ts'
import { presentTherapist } from '../presenters/therapists.ts'
import { listTherapists } from '../queries/therapists.ts'

export const therapistRoutes = (): Router => {
  const router = Router()

  router.get('/therapists', allow(therapistPolicies.list), async (req, res) => {
    const viewer = viewerOf(req)
    res.json((await listTherapists()).map((row) => presentTherapist(row, viewer)))
  })

  return router
}
