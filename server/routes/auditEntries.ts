import { Router } from 'express'
import { allow } from '../middleware/allow.ts'
import { pageOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { auditEntryPolicies } from '../policies/auditEntries.ts'
import { presentAccessEntry } from '../presenters/auditEntries.ts'
import { presentPage } from '../presenters/pages.ts'
import { listAccess } from '../queries/auditEntries.ts'
import { recordChildRead } from '../services/audit.ts'

export const auditEntryRoutes = (): Router => {
  const router = Router()

  router.get('/children/:childId/access-history', allow(auditEntryPolicies.ofChild), async (req, res) => {
    const access = accessOf(req)
    const page = pageOf(req)
    const entries = await listAccess(access, page)
    await recordChildRead(req.actor, access, 'accessHistory.read')
    res.json(presentPage(entries, page, (row) => presentAccessEntry(row, access)))
  })

  return router
}
