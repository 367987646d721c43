import { Router, type Request } from 'express'
import { allocationSchema, careSchema, childIdentitySchema } from '../../shared/children.ts'
import { stateChangeSchema } from '../../shared/episodes.ts'
import { notFound } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, ifMatchOf, pageOf, queryText } from '../middleware/requestBody.ts'
import { accessOf, viewerOf } from '../middleware/requestContext.ts'
import { childPolicies, seesClinicalFields } from '../policies/children.ts'
import { presentGlance } from '../presenters/children/glance.ts'
import {
  presentCare,
  presentChildHeader,
  presentEpisodeState,
  presentFoundChild,
  presentIdentity,
  presentRegisterRow,
} from '../presenters/children/header.ts'
import { presentPage } from '../presenters/pages.ts'
import { findCare } from '../queries/children/care.ts'
import { findLastOnRecord, listForGlance } from '../queries/children/glance.ts'
import { findChildHead, listOpenAlerts } from '../queries/children/header.ts'
import { findIdentity } from '../queries/children/identity.ts'
import { findChildren, listRegister } from '../queries/children/lists.ts'
import { findEpisode } from '../queries/episodes.ts'
import { listLockedHandEvidence } from '../queries/handEvidence.ts'
import { recordAudit, recordChildRead } from '../services/audit.ts'
import { allocate, changeCare, changeIdentity } from '../services/children.ts'
import { changeState } from '../services/episodes.ts'
import { clinicToday, readSettings } from '../services/settings.ts'
import { answerStale } from '../services/versions.ts'

const leastToSearch = 2

export const childRoutes = (): Router => {
  const router = Router()
  const idsOf = (rows: readonly { id: string }[]) => ({ detail: { ids: rows.map((row) => row.id) } })

  router.get('/children', allow(childPolicies.register), async (req, res) => {
    const page = pageOf(req)
    const children = await listRegister(viewerOf(req), queryText(req, 'search'), page)
    await recordAudit(req.actor, { action: 'child.listed', ...idsOf(children.rows) })
    res.json(presentPage(children, page, presentRegisterRow))
  })

  router.get('/children/find', allow(childPolicies.find), async (req, res) => {
    const words = queryText(req, 'q') ?? ''
    const found = words.length < leastToSearch ? [] : await findChildren(viewerOf(req), words)
    await recordAudit(req.actor, { action: 'child.looked_for', ...idsOf(found) })
    res.json(found.map(presentFoundChild))
  })

  router.get('/children/:childId', allow(childPolicies.header), async (req, res) => {
    const access = accessOf(req)
    const [child, alerts, settings] = await Promise.all([
      findChildHead(access),
      seesClinicalFields(access) ? listOpenAlerts(access) : [],
      readSettings(),
    ])
    await recordChildRead(req.actor, access, 'child.header_read')
    res.json(presentChildHeader(child, alerts, access, settings, clinicToday(settings)))
  })

  router.get('/children/:childId/glance', allow(childPolicies.glance), async (req, res) => {
    const access = accessOf(req)
    const [child, last, lists, evidence, settings] = await Promise.all([
      findChildHead(access),
      findLastOnRecord(access),
      listForGlance(access),
      listLockedHandEvidence(access),
      readSettings(),
    ])
    await recordChildRead(req.actor, access, 'child.glance_read')
    res.json(presentGlance({ child, last, lists, evidence }, access, settings, clinicToday(settings)))
  })

  const identity = '/children/:childId/identity'
  const showIdentity = async (req: Request) =>
    presentIdentity(await findIdentity(accessOf(req)), accessOf(req))

  const readIdentity = async (req: Request) => {
    const view = await showIdentity(req)
    await recordChildRead(req.actor, accessOf(req), 'child.identity_read')
    return view
  }

  router.get(identity, allow(childPolicies.identity), async (req, res) => {
    res.json(await readIdentity(req))
  })

  router.put(identity, allow(childPolicies.changeIdentity), async (req, res) => {
    const version = ifMatchOf(req)
    const details = await bodyOf(req, childIdentitySchema)
    await answerStale(changeIdentity(req.actor, accessOf(req), version, details), () => readIdentity(req))
    res.json(await showIdentity(req))
  })

  router.patch('/children/:childId/care', allow(childPolicies.changeCare), async (req, res) => {
    const version = ifMatchOf(req)
    const access = accessOf(req)
    const care = await bodyOf(req, careSchema)
    await answerStale(changeCare(req.actor, access, version, care), async () => {
      const current = await findCare(access)
      await recordChildRead(req.actor, access, 'child.care_read')
      return presentCare(current)
    })
    res.status(204).end()
  })

  router.post('/children/:childId/state', allow(childPolicies.changeState), async (req, res) => {
    const version = ifMatchOf(req)
    const access = accessOf(req)
    const change = await bodyOf(req, stateChangeSchema)
    await answerStale(changeState(req.actor, access, version, change), async () => {
      const current = await findEpisode(access)
      if (!current) throw notFound()
      await recordChildRead(req.actor, access, 'episode.read', {
        objectType: 'episode',
        objectId: current.id,
      })
      return presentEpisodeState(current)
    })
    res.status(204).end()
  })

  router.post('/children/:childId/allocation', allow(childPolicies.allocate), async (req, res) => {
    await allocate(req.actor, accessOf(req), await bodyOf(req, allocationSchema))
    res.status(204).end()
  })

  return router
}
