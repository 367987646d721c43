import { Router, type Request } from 'express'
import {
  conclusionContentSchema,
  conclusionStartSchema,
  signConclusionSchema,
  type ConclusionContent,
} from '../../shared/conclusions.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, ifMatchOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { conclusionPolicies } from '../policies/conclusions.ts'
import { presentConclusion } from '../presenters/conclusions.ts'
import { findConclusion, listConclusions } from '../queries/conclusions.ts'
import { recordChildRead } from '../services/audit.ts'
import { printReport } from '../services/conclusionReport.ts'
import { checkConclusion, countersignConclusion, signConclusion } from '../services/conclusionSigning.ts'
import { discardConclusion, saveConclusion, startConclusion } from '../services/conclusions.ts'
import { answerStale } from '../services/versions.ts'

const base = '/children/:childId/conclusions'

const idOf = (req: Request) => String(req.params.conclusionId)

const view = async (req: Request, id: string) =>
  presentConclusion(await findConclusion(accessOf(req), id), accessOf(req))

const recordRead = (req: Request, action: string, id: string) =>
  recordChildRead(req.actor, accessOf(req), action, { objectType: 'conclusion', objectId: id })

const viewForReading = async (req: Request, id: string) => {
  const shown = await view(req, id)
  await recordRead(req, 'conclusion.read', id)
  return shown
}

export const conclusionRoutes = (): Router => {
  const router = Router()

  router.get(base, allow(conclusionPolicies.list), async (req, res) => {
    const access = accessOf(req)
    const conclusions = await listConclusions(access)
    await recordChildRead(req.actor, access, 'conclusions.list', {
      detail: { ids: conclusions.map(({ id }) => id) },
    })
    res.json(conclusions.map((conclusion) => presentConclusion(conclusion, access)))
  })

  router.post(base, allow(conclusionPolicies.start), async (req, res) => {
    const start = await bodyOf(req, conclusionStartSchema)
    const id = await startConclusion(req.actor, accessOf(req), start, idempotencyKeyOf(req))
    res.status(201).json(await view(req, id))
  })

  router.get(`${base}/:conclusionId`, allow(conclusionPolicies.read), async (req, res) => {
    res.json(await viewForReading(req, idOf(req)))
  })

  router.put(`${base}/:conclusionId`, allow(conclusionPolicies.change), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    const content: ConclusionContent = await bodyOf(req, conclusionContentSchema)
    const saved = await answerStale(saveConclusion(req.actor, accessOf(req), id, version, content), () =>
      viewForReading(req, id),
    )
    res.json(presentConclusion(saved, accessOf(req)))
  })

  router.delete(`${base}/:conclusionId`, allow(conclusionPolicies.discard), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    await answerStale(discardConclusion(req.actor, accessOf(req), id, version), () => viewForReading(req, id))
    res.status(204).end()
  })

  router.get(`${base}/:conclusionId/check`, allow(conclusionPolicies.check), async (req, res) => {
    const conclusion = await findConclusion(accessOf(req), idOf(req))
    const check = await checkConclusion(accessOf(req), conclusion)
    await recordRead(req, 'conclusion.check_read', conclusion.id)
    res.json(check)
  })

  router.post(`${base}/:conclusionId/sign`, allow(conclusionPolicies.sign), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    await bodyOf(req, signConclusionSchema)
    await answerStale(signConclusion(req.actor, accessOf(req), id, version), () => viewForReading(req, id))
    res.json(await view(req, id))
  })

  router.post(
    `${base}/:conclusionId/countersign`,
    allow(conclusionPolicies.countersign),
    async (req, res) => {
      const id = idOf(req)
      const version = ifMatchOf(req)
      await bodyOf(req, signConclusionSchema)
      await answerStale(countersignConclusion(req.actor, accessOf(req), id, version), () =>
        viewForReading(req, id),
      )
      res.json(await view(req, id))
    },
  )

  router.get(`${base}/:conclusionId/report.pdf`, allow(conclusionPolicies.report), async (req, res) => {
    const conclusion = await findConclusion(accessOf(req), idOf(req))
    const report = await printReport(conclusion)
    await recordRead(req, 'conclusion.report_opened', conclusion.id)
    res.type('application/pdf')
    res.setHeader('Content-Disposition', `inline; filename="assessment-report-${report.day}.pdf"`)
    res.send(report.pdf)
  })

  return router
}
