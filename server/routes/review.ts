import { Router } from 'express'
import { reviewFigureIds, type ReviewListPage } from '../../shared/review.ts'
import { reviewFigureTexts } from '../../shared/reviewFigures.ts'
import { now } from '../clock.ts'
import { notFound } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import { pageOf } from '../middleware/requestBody.ts'
import { viewerOf } from '../middleware/requestContext.ts'
import { reviewPolicies } from '../policies/review.ts'
import { presentPage } from '../presenters/pages.ts'
import { presentReview } from '../presenters/review.ts'
import { presentWorkItem } from '../presenters/workItems.ts'
import { listLoadedTherapists, listOpenCases, listWaiting } from '../queries/review.ts'
import { countWork, listWork } from '../queries/workLists.ts'
import { recordAudit } from '../services/audit.ts'
import { clinicToday, readSettings } from '../services/settings.ts'

/** The moment and thresholds all figures of one answer share. */
const readClock = async () => {
  const settings = await readSettings()
  return { today: clinicToday(settings), now: now(), settings }
}

export const reviewRoutes = (): Router => {
  const router = Router()

  router.get('/review', allow(reviewPolicies.figures), async (req, res) => {
    const viewer = viewerOf(req)
    const clock = await readClock()
    const [counts, waiting, cases, therapists] = await Promise.all([
      countWork(reviewFigureIds, { viewer, relation: 'clinicLead' }, clock),
      listWaiting(viewer),
      listOpenCases(viewer),
      listLoadedTherapists(),
    ])
    await recordAudit(req.actor, {
      action: 'review.read',
      detail: { ids: waiting.map((row) => row.childId) },
    })
    res.json(presentReview({ counts, waiting, cases, therapists }, clock))
  })

  router.get('/review/:figure', allow(reviewPolicies.list), async (req, res) => {
    const figure = reviewFigureIds.find((id) => id === req.params.figure)
    if (!figure) throw notFound()
    const page = pageOf(req)
    const clock = await readClock()
    const reach = { viewer: viewerOf(req), relation: 'clinicLead' } as const
    const rows = await listWork(figure, reach, clock, page)
    await recordAudit(req.actor, {
      action: 'review.listed',
      objectType: 'figure',
      objectId: figure,
      detail: { ids: rows.rows.map((row) => row.childId ?? row.id) },
    })
    const list: ReviewListPage = {
      ...presentPage(rows, page, (row) => presentWorkItem(figure, row, clock)),
      ...reviewFigureTexts(clock.settings)[figure],
    }
    res.json(list)
  })

  return router
}
