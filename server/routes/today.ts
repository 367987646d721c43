import { Router } from 'express'
import { now } from '../clock.ts'
import { allow } from '../middleware/allow.ts'
import { viewerOf } from '../middleware/requestContext.ts'
import { todayPolicies } from '../policies/today.ts'
import { presentToday } from '../presenters/today.ts'
import { listToday } from '../queries/today.ts'
import { recordAudit } from '../services/audit.ts'
import { clinicToday, readSettings } from '../services/settings.ts'

export const todayRoutes = (): Router => {
  const router = Router()

  router.get('/today', allow(todayPolicies.read), async (req, res) => {
    const viewer = viewerOf(req)
    const settings = await readSettings()
    const clock = { today: clinicToday(settings), now: now(), settings }
    const groups = await listToday(viewer, clock)
    await recordAudit(req.actor, {
      action: 'today.read',
      detail: { ids: groups.flatMap((group) => group.rows.map((row) => row.childId ?? row.id)) },
    })
    res.json(presentToday(groups, viewer.displayName, clock))
  })

  return router
}
