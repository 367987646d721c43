import { Router, type Request } from 'express'
import { emptySchema } from '../../shared/fields.ts'
import { staffInvitationSchema, userChangeSchema } from '../../shared/users.ts'
import { notFound } from '../errors.ts'
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
import { searchableRoles, userPolicies } from '../policies/users.ts'
import { presentPage } from '../presenters/pages.ts'
import { presentUser } from '../presenters/users.ts'
import { findUser, listUsers } from '../queries/users.ts'
import { recordAudit } from '../services/audit.ts'
import { changeUser, disableUser, enableUser, inviteUser } from '../services/users.ts'
import { answerStale } from '../services/versions.ts'
import type { RouteSettings } from './all.ts'

export const userRoutes = ({ appUrl }: RouteSettings): Router => {
  const router = Router()
  const idOf = (req: Request) => String(req.params.userId)

  const show = async (req: Request, id: string) => {
    const viewer = viewerOf(req)
    const user = await findUser(viewer, id)
    if (!user) throw notFound()
    return presentUser(user, viewer)
  }

  router.get('/users', allow(userPolicies.list), async (req, res) => {
    const viewer = viewerOf(req)
    const page = pageOf(req)
    const role = queryChoice(req, 'role', searchableRoles(viewer))
    const users = await listUsers(viewer, { search: queryText(req, 'search'), role }, page)
    await recordAudit(req.actor, {
      action: 'user.listed',
      objectType: 'user',
      detail: { ids: users.rows.map((row) => row.id) },
    })
    res.json(presentPage(users, page, (row) => presentUser(row, viewer)))
  })

  router.post('/invitations', allow(userPolicies.invite), async (req, res) => {
    const invitation = await bodyOf(req, staffInvitationSchema)
    const id = await inviteUser(req.actor, viewerOf(req), invitation, { key: idempotencyKeyOf(req), appUrl })
    res.status(201).json(await show(req, id))
  })

  router.patch('/users/:userId', allow(userPolicies.change), async (req, res) => {
    const version = ifMatchOf(req)
    const change = await bodyOf(req, userChangeSchema)
    await answerStale(changeUser(req.actor, viewerOf(req), idOf(req), version, change), async () => {
      const user = await show(req, idOf(req))
      await recordAudit(req.actor, { action: 'user.read', objectType: 'user', objectId: user.id })
      return user
    })
    res.json(await show(req, idOf(req)))
  })

  router.post('/users/:userId/disable', allow(userPolicies.disable), async (req, res) => {
    await bodyOf(req, emptySchema)
    await disableUser(req.actor, viewerOf(req), idOf(req))
    res.status(204).end()
  })

  router.post('/users/:userId/enable', allow(userPolicies.enable), async (req, res) => {
    await bodyOf(req, emptySchema)
    await enableUser(req.actor, viewerOf(req), idOf(req))
    res.status(204).end()
  })

  return router
}
