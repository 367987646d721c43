import { Router, type Request } from 'express'
import { isDay } from '../../shared/days.ts'
import {
  acceptReferralSchema,
  declineReferralSchema,
  referralSchema,
  referralStatuses,
} from '../../shared/referrals.ts'
import { invalid } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import {
  bodyOf,
  idempotencyKeyOf,
  ifMatchOf,
  pageOf,
  queryChoice,
  queryText,
} from '../middleware/requestBody.ts'
import { viewerOf } from '../middleware/requestContext.ts'
import { referralPolicies } from '../policies/referrals.ts'
import { presentPage } from '../presenters/pages.ts'
import { presentDuplicate, presentReferralRow } from '../presenters/referrals.ts'
import { listReferrals, referralSorts } from '../queries/referrals.ts'
import { listSameChild, type NamedChild } from '../queries/sameChild.ts'
import { recordAudit } from '../services/audit.ts'
import { acceptReferral } from '../services/referrals/accept.ts'
import { changeReferral, declineReferral, enterReferral, viewReferral } from '../services/referrals/enter.ts'
import { clinicToday, readSettings } from '../services/settings.ts'

const namedChildOf = (req: Request): NamedChild => {
  const [givenName, familyName, birthDate] = ['givenName', 'familyName', 'birthDate'].map((name) =>
    queryText(req, name),
  )
  const fields: Record<string, string> = {}
  if (!givenName) fields.givenName = 'Enter the given name'
  if (!familyName) fields.familyName = 'Enter the family name'
  if (!birthDate || !isDay(birthDate)) fields.birthDate = 'Enter the date of birth'
  if (!givenName || !familyName || !birthDate || Object.keys(fields).length > 0) throw invalid(fields)
  return { givenName, familyName, birthDate }
}

export const referralRoutes = (): Router => {
  const router = Router()
  const idOf = (req: Request) => String(req.params.referralId)

  router.get('/referrals', allow(referralPolicies.list), async (req, res) => {
    const page = pageOf(req)
    const referrals = await listReferrals(viewerOf(req), {
      ...page,
      status: queryChoice(req, 'status', referralStatuses),
      search: queryText(req, 'search'),
      sort: queryChoice(req, 'sort', referralSorts) ?? 'receivedOn',
      direction: queryChoice(req, 'direction', ['asc', 'desc']) ?? 'desc',
    })
    const today = clinicToday(await readSettings())
    await recordAudit(req.actor, {
      action: 'referral.listed',
      objectType: 'referral',
      detail: { ids: referrals.rows.map((row) => row.id) },
    })
    res.json(presentPage(referrals, page, (row) => presentReferralRow(row, today)))
  })

  router.get('/referrals/duplicates', allow(referralPolicies.duplicates), async (req, res) => {
    const rows = await listSameChild(namedChildOf(req), null, undefined, { reader: viewerOf(req) })
    await recordAudit(req.actor, {
      action: 'referral.duplicates_looked_up',
      detail: { ids: rows.map((row) => row.id) },
    })
    res.json(rows.map(presentDuplicate))
  })

  router.post('/referrals', allow(referralPolicies.enter), async (req, res) => {
    const viewer = viewerOf(req)
    const details = await bodyOf(req, referralSchema)
    const id = await enterReferral(req.actor, viewer, details, idempotencyKeyOf(req))
    res.status(201).json(await viewReferral(viewer, id))
  })

  router.get('/referrals/:referralId', allow(referralPolicies.read), async (req, res) => {
    const referral = await viewReferral(viewerOf(req), idOf(req))
    await recordAudit(req.actor, {
      action: 'referral.read',
      objectType: 'referral',
      objectId: referral.id,
      childId: referral.childId,
    })
    res.json(referral)
  })

  router.put('/referrals/:referralId', allow(referralPolicies.change), async (req, res) => {
    const viewer = viewerOf(req)
    await changeReferral(req.actor, viewer, idOf(req), ifMatchOf(req), await bodyOf(req, referralSchema))
    res.json(await viewReferral(viewer, idOf(req)))
  })

  router.post('/referrals/:referralId/accept', allow(referralPolicies.accept), async (req, res) => {
    const decision = await bodyOf(req, acceptReferralSchema)
    const childId = await acceptReferral(req.actor, viewerOf(req), idOf(req), ifMatchOf(req), decision)
    res.json({ childId })
  })

  router.post('/referrals/:referralId/decline', allow(referralPolicies.decline), async (req, res) => {
    const viewer = viewerOf(req)
    const decision = await bodyOf(req, declineReferralSchema)
    await declineReferral(req.actor, viewer, idOf(req), ifMatchOf(req), decision)
    res.json(await viewReferral(viewer, idOf(req)))
  })

  return router
}
