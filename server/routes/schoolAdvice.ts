import { Router, type Request } from 'express'
import { publishAdviceSchema } from '../../shared/schoolAdvice.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { schoolAdvicePolicies } from '../policies/schoolAdvice.ts'
import { presentChildSchool } from '../presenters/schoolAdvice.ts'
import { readAdviceFacts } from '../queries/adviceFacts.ts'
import { isConsentGiven } from '../queries/childFacts.ts'
import { findChildSchool, listAdvice } from '../queries/schoolAdvice.ts'
import { recordChildRead } from '../services/audit.ts'
import { endAdvice, publishAdvice } from '../services/schoolAdvice.ts'
import { clinicToday, readSettings } from '../services/settings.ts'

const childSchool = async (req: Request) => {
  const access = accessOf(req)
  const settings = await readSettings()
  const [school, facts, shared, advice] = await Promise.all([
    findChildSchool(access),
    readAdviceFacts(access, clinicToday(settings)),
    isConsentGiven(access, 'share_school_seating'),
    listAdvice(access),
  ])
  return presentChildSchool(school, { facts, shared, advice }, access, settings.timeZone)
}

/** What the record calls for in class, and what the therapist gives to the teacher. */
export const schoolAdviceRoutes = (): Router => {
  const router = Router()

  router.get('/children/:childId/school', allow(schoolAdvicePolicies.read), async (req, res) => {
    const view = await childSchool(req)
    await recordChildRead(req.actor, accessOf(req), 'schoolAdvice.read', {
      detail: { ids: view.published.map((advice) => advice.id) },
    })
    res.json(view)
  })

  router.post('/children/:childId/advice', allow(schoolAdvicePolicies.publish), async (req, res) => {
    const advice = await bodyOf(req, publishAdviceSchema)
    await publishAdvice(req.actor, accessOf(req), advice, idempotencyKeyOf(req))
    res.status(201).json(await childSchool(req))
  })

  router.post(
    '/children/:childId/advice/:adviceId/end',
    allow(schoolAdvicePolicies.end),
    async (req, res) => {
      await endAdvice(req.actor, accessOf(req), String(req.params.adviceId))
      res.status(204).end()
    },
  )

  return router
}
