import { Router, type Request } from 'express'
import { emptySchema } from '../../shared/fields.ts'
import { measureDraftSchema, measureStartSchema, type MeasureDraft } from '../../shared/measureSchemas.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, ifMatchOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { measurePolicies } from '../policies/measures.ts'
import { presentMeasure } from '../presenters/measures.ts'
import { findMeasure, listMeasures } from '../queries/measures.ts'
import { recordChildRead } from '../services/audit.ts'
import { discardMeasure, lockMeasure, saveMeasure, startMeasure } from '../services/measures.ts'
import { answerStale } from '../services/versions.ts'

const base = '/children/:childId/measures'
const one = `${base}/:measureId`

const idOf = (req: Request) => String(req.params.measureId)

const view = async (req: Request, id: string) =>
  presentMeasure(await findMeasure(accessOf(req), id), accessOf(req))

const viewForReading = async (req: Request, id: string) => {
  const shown = await view(req, id)
  await recordChildRead(req.actor, accessOf(req), 'measure.read', { objectType: 'measure', objectId: id })
  return shown
}

export const measureRoutes = (): Router => {
  const router = Router()

  router.get(base, allow(measurePolicies.list), async (req, res) => {
    const access = accessOf(req)
    const measures = await listMeasures(access)
    await recordChildRead(req.actor, access, 'measures.list', {
      detail: { ids: measures.map((measure) => measure.id) },
    })
    res.json(measures.map((measure) => presentMeasure(measure, access)))
  })

  router.post(base, allow(measurePolicies.start), async (req, res) => {
    const start = await bodyOf(req, measureStartSchema)
    const id = await startMeasure(req.actor, accessOf(req), start, idempotencyKeyOf(req))
    res.status(201).json(await view(req, id))
  })

  router.get(one, allow(measurePolicies.read), async (req, res) => {
    res.json(await viewForReading(req, idOf(req)))
  })

  router.put(one, allow(measurePolicies.change), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    const draft = (await bodyOf(req, measureDraftSchema)) as MeasureDraft
    const saved = await answerStale(saveMeasure(req.actor, accessOf(req), id, version, draft), () =>
      viewForReading(req, id),
    )
    res.json(presentMeasure(saved, accessOf(req)))
  })

  router.delete(one, allow(measurePolicies.discard), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    await answerStale(discardMeasure(req.actor, accessOf(req), id, version), () => viewForReading(req, id))
    res.status(204).end()
  })

  router.post(`${one}/lock`, allow(measurePolicies.lock), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    await bodyOf(req, emptySchema)
    await answerStale(lockMeasure(req.actor, accessOf(req), id, version), () => viewForReading(req, id))
    res.json(await view(req, id))
  })

  return router
}
