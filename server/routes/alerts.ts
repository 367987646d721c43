import { Router } from 'express'
import { alertActionSchema, alertRaisedSchema, type AlertPage } from '../../shared/alerts.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, pageOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { alertPolicies } from '../policies/alerts.ts'
import { presentAlert } from '../presenters/alerts.ts'
import { presentPage } from '../presenters/pages.ts'
import { findAlert, listAlerts } from '../queries/alerts.ts'
import { actOnAlert, raiseByHand } from '../services/alerts.ts'
import { recordChildRead } from '../services/audit.ts'

const base = '/children/:childId/alerts'

export const alertRoutes = (): Router => {
  const router = Router()

  router.get(base, allow(alertPolicies.list), async (req, res) => {
    const access = accessOf(req)
    const page = pageOf(req)
    const alerts = await listAlerts(access, page)
    await recordChildRead(req.actor, access, 'alerts.list', {
      detail: { ids: alerts.rows.map(({ id }) => id) },
    })
    const shown = presentPage(alerts, page, (alert) => presentAlert(alert, access))
    const body: AlertPage = { ...shown, open: alerts.open }
    res.json(body)
  })

  router.post(base, allow(alertPolicies.raise), async (req, res) => {
    const access = accessOf(req)
    const raised = await bodyOf(req, alertRaisedSchema)
    const id = await raiseByHand(req.actor, access, raised, idempotencyKeyOf(req))
    res.status(201).json(presentAlert(await findAlert(access, id), access))
  })

  router.post(`${base}/:alertId/action`, allow(alertPolicies.act), async (req, res) => {
    const action = await bodyOf(req, alertActionSchema)
    await actOnAlert(req.actor, accessOf(req), String(req.params.alertId), action)
    res.status(204).end()
  })

  return router
}
