import { Router, type Request } from 'express'
import { emptySchema } from '../../shared/fields.ts'
import { historyDraftSchema, historyStartSchema, type HistoryDraft } from '../../shared/histories.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, ifMatchOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { historyPolicies } from '../policies/histories.ts'
import { presentHistory } from '../presenters/histories.ts'
import { findHistory, listHistories, type HistoryRecord } from '../queries/histories.ts'
import { recordChildRead } from '../services/audit.ts'
import { changeHistory, closeHistory, discardHistory, startHistory } from '../services/histories.ts'
import { readSettings } from '../services/settings.ts'
import { answerStale } from '../services/versions.ts'

const base = '/children/:childId/histories'
const one = `${base}/:historyId`

const idOf = (req: Request) => String(req.params.historyId)

const present = async (req: Request, history: HistoryRecord) =>
  presentHistory(history, accessOf(req), (await readSettings()).correctedUntilMonths)

const view = async (req: Request, id: string) => present(req, await findHistory(accessOf(req), id))

const viewForReading = async (req: Request, id: string) => {
  const shown = await view(req, id)
  await recordChildRead(req.actor, accessOf(req), 'history.read', { objectType: 'history', objectId: id })
  return shown
}

export const historyRoutes = (): Router => {
  const router = Router()

  router.get(base, allow(historyPolicies.list), async (req, res) => {
    const access = accessOf(req)
    const [histories, settings] = await Promise.all([listHistories(access), readSettings()])
    await recordChildRead(req.actor, access, 'histories.list', {
      detail: { ids: histories.map(({ id }) => id) },
    })
    res.json(histories.map((history) => presentHistory(history, access, settings.correctedUntilMonths)))
  })

  router.post(base, allow(historyPolicies.start), async (req, res) => {
    const start = await bodyOf(req, historyStartSchema)
    const id = await startHistory(req.actor, accessOf(req), start, idempotencyKeyOf(req))
    res.status(201).json(await view(req, id))
  })

  router.get(one, allow(historyPolicies.read), async (req, res) => {
    res.json(await viewForReading(req, idOf(req)))
  })

  router.put(one, allow(historyPolicies.change), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    const draft: HistoryDraft = await bodyOf(req, historyDraftSchema)
    const saved = await answerStale(changeHistory(req.actor, accessOf(req), id, version, draft), () =>
      viewForReading(req, id),
    )
    res.json(await present(req, saved))
  })

  router.delete(one, allow(historyPolicies.discard), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    await answerStale(discardHistory(req.actor, accessOf(req), id, version), () => viewForReading(req, id))
    res.status(204).end()
  })

  router.post(`${one}/lock`, allow(historyPolicies.lock), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    await bodyOf(req, emptySchema)
    await answerStale(closeHistory(req.actor, accessOf(req), id, version), () => viewForReading(req, id))
    res.json(await view(req, id))
  })

  return router
}
