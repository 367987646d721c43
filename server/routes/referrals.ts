import { Router, type Request } from 'express'
import { isDay } from '../../shared/days.ts'
import {
  acceptReferralSchema,
  declineReferralSchema,
  referralSchema,
  referralStatuses,
} from '../../shared/referrals.ts'
import { conflict, invalid } from '../errors.ts'
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
import { isUndecided, referralPolicies } from '../policies/referrals.ts'
import { presentPage } from '../presenters/pages.ts'
import { presentDuplicate, presentReferral, presentReferralRow } from '../presenters/referrals.ts'
import { findReferral, listReferrals, referralSorts } from '../queries/referrals.ts'
import { listSameChild, type NamedChild } from '../queries/sameChild.ts'
import { recordAudit } from '../services/audit.ts'
import { acceptReferral } from '../services/referrals/accept.ts'
import { SameChildKnown } from '../services/referrals/child.ts'
import { changeReferral, declineReferral, enterReferral } from '../services/referrals/enter.ts'
import { clinicToday, readSettings } from '../services/settings.ts'
import { answerStale } from '../services/versions.ts'

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

const refuseSecondRecord = (error: unknown): never => {
  if (!(error instanceof SameChildKnown)) throw error
  throw conflict(
    'duplicate',
    'A child of this name and birth date is on the register. Say whether this is the same child.',
    error.known.map(presentDuplicate),
  )
}

export const referralRoutes = (): Router => {
  const router = Router()
  const idOf = (req: Request) => String(req.params.referralId)

  /** The referral as this viewer sees it, with who else bears the name. */
  const view = async (req: Request, id: string) => {
    const viewer = viewerOf(req)
    const record = await findReferral(viewer, id)
    const sameChild = isUndecided(record.status)
      ? await listSameChild(record.details, id, undefined, { reader: viewer })
      : []
    return presentReferral(record, sameChild, viewer)
  }

  const viewForReading = async (req: Request) => {
    const referral = await view(req, idOf(req))
    await recordAudit(req.actor, {
      action: 'referral.read',
      objectType: 'referral',
      objectId: referral.id,
      childId: referral.childId,
    })
    return referral
  }

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
    res.status(201).json(await view(req, id))
  })

  router.get('/referrals/:referralId', allow(referralPolicies.read), async (req, res) => {
    res.json(await viewForReading(req))
  })

  router.put('/referrals/:referralId', allow(referralPolicies.change), async (req, res) => {
    const version = ifMatchOf(req)
    const details = await bodyOf(req, referralSchema)
    await answerStale(changeReferral(req.actor, viewerOf(req), idOf(req), version, details), () =>
      viewForReading(req),
    )
    res.json(await view(req, idOf(req)))
  })

  router.post('/referrals/:referralId/accept', allow(referralPolicies.accept), async (req, res) => {
    const version = ifMatchOf(req)
    const decision = await bodyOf(req, acceptReferralSchema)
    const accepting = acceptReferral(req.actor, viewerOf(req), idOf(req), version, decision)
    res.json({ childId: await answerStale(accepting.catch(refuseSecondRecord), () => viewForReading(req)) })
  })

  router.post('/referrals/:referralId/decline', allow(referralPolicies.decline), async (req, res) => {
    const version = ifMatchOf(req)
    const decision = await bodyOf(req, declineReferralSchema)
    await answerStale(declineReferral(req.actor, viewerOf(req), idOf(req), version, decision), () =>
      viewForReading(req),
    )
    res.json(await view(req, idOf(req)))
  })

  return router
}
