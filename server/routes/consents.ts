import { Router } from 'express'
import { consentSchema, consentWithdrawalSchema } from '../../shared/consents.ts'
import { now } from '../clock.ts'
import { notFound } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { consentPolicies } from '../policies/consents.ts'
import { presentConsent } from '../presenters/consents.ts'
import { listConsents } from '../queries/consents.ts'
import { recordChildRead } from '../services/audit.ts'
import { recordConsent, recordWithdrawal } from '../services/consents.ts'

const base = '/children/:childId/consents'

export const consentRoutes = (): Router => {
  const router = Router()

  router.get(base, allow(consentPolicies.list), async (req, res) => {
    const access = accessOf(req)
    const rows = await listConsents(access)
    await recordChildRead(req.actor, access, 'consent.listed', { detail: { ids: rows.map((row) => row.id) } })
    res.json(rows.map((row) => presentConsent(row, access, now())))
  })

  router.post(base, allow(consentPolicies.record), async (req, res) => {
    const access = accessOf(req)
    const id = await recordConsent(req.actor, access, await bodyOf(req, consentSchema))
    const [row] = await listConsents(access, id)
    if (!row) throw notFound()
    res.status(201).json(presentConsent(row, access, now()))
  })

  router.post(`${base}/:consentId/withdraw`, allow(consentPolicies.withdraw), async (req, res) => {
    const withdrawal = await bodyOf(req, consentWithdrawalSchema)
    await recordWithdrawal(req.actor, accessOf(req), String(req.params.consentId), withdrawal)
    res.status(204).end()
  })

  return router
}
