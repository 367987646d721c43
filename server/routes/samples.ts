import { Router, type Request, type Response } from 'express'
import { sampleDetailsSchema, type SampleType } from '../../shared/samples.ts'
import { invalid } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import { checkBounds } from '../middleware/bodyBounds.ts'
import { idempotencyKeyOf, parseBody } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { samplePolicies } from '../policies/samples.ts'
import { presentSample, presentSampleWall } from '../presenters/samples.ts'
import { isConsentGiven } from '../queries/childFacts.ts'
import { findSample, findSampleThumbnail, listSamples } from '../queries/samples.ts'
import { recordChildRead } from '../services/audit.ts'
import { addSample, readSampleFile, removeSample } from '../services/samples.ts'
import { receiveUpload } from '../uploads/receiveUpload.ts'

const base = '/children/:childId/samples'

const idOf = (req: Request) => String(req.params.sampleId)

const fromText = (text: unknown): unknown => {
  try {
    return JSON.parse(String(text))
  } catch {
    throw invalid({ details: 'What belongs to the sample could not be read. Reload the page.' })
  }
}

/** The text part of the upload: one field, `details`, as JSON. */
const detailsOf = (req: Request) => {
  const { details, ...others } = (req.body ?? {}) as Record<string, unknown>
  const unknown = Object.keys(others)[0]
  if (unknown !== undefined) throw invalid({ form: `This form sent a field that is not known: ${unknown}` })
  const given = fromText(details)
  checkBounds(given)
  return parseBody(sampleDetailsSchema, given)
}

const endings: Record<SampleType, string> = {
  'image/jpeg': 'jpg',
  'image/png': 'png',
  'image/webp': 'webp',
  'application/pdf': 'pdf',
}

/**
 * Sends stored bytes so that a browser can only show them: own type, nothing guessed, no script even when opened alone.
 * Pictures may be shown in place, a PDF is always saved. The name is ours, of letters, digits and hyphens only.
 */
const sendFile = (
  res: Response,
  { type, name, bytes }: { type: SampleType; name: string; bytes: Buffer },
) => {
  const disposition = type === 'application/pdf' ? 'attachment' : 'inline'
  const safeName = name.replace(/[^A-Za-z0-9-]+/g, '-')
  res.setHeader('Content-Type', type)
  res.setHeader('X-Content-Type-Options', 'nosniff')
  res.setHeader('Content-Security-Policy', "default-src 'none'; sandbox")
  res.setHeader('Content-Disposition', `${disposition}; filename="${safeName}.${endings[type]}"`)
  res.send(bytes)
}

export const sampleRoutes = (): Router => {
  const router = Router()

  router.get(base, allow(samplePolicies.list), async (req, res) => {
    const access = accessOf(req)
    const samples = await listSamples(access)
    const consented = await isConsentGiven(access, 'store_work_samples')
    await recordChildRead(req.actor, access, 'samples.list', {
      detail: { ids: samples.map((sample) => sample.id) },
    })
    res.json(presentSampleWall(samples, access, consented))
  })

  router.post(base, allow(samplePolicies.add), receiveUpload, async (req, res) => {
    const access = accessOf(req)
    const details = await detailsOf(req)
    if (!req.file) throw invalid({ file: 'Choose a file' })
    const id = await addSample(req.actor, access, details, req.file, idempotencyKeyOf(req))
    res.status(201).json(presentSample(await findSample(access, id), access))
  })

  router.get(`${base}/:sampleId/file`, allow(samplePolicies.file), async (req, res) => {
    const file = await readSampleFile(req.actor, accessOf(req), idOf(req))
    const name = `handwriting-${file.takenOn}-${file.recordNumber}`
    sendFile(res, { type: file.contentType, name, bytes: file.content })
  })

  router.get(`${base}/:sampleId/thumbnail`, allow(samplePolicies.thumbnail), async (req, res) => {
    const access = accessOf(req)
    const bytes = await findSampleThumbnail(access, idOf(req))
    await recordChildRead(req.actor, access, 'sample.thumbnail', {
      objectType: 'sample',
      objectId: idOf(req),
    })
    sendFile(res, { type: 'image/jpeg', name: 'handwriting-small', bytes })
  })

  router.delete(`${base}/:sampleId`, allow(samplePolicies.remove), async (req, res) => {
    await removeSample(req.actor, accessOf(req), idOf(req))
    res.status(204).end()
  })

  return router
}
