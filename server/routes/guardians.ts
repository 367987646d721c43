import { Router, type Request } from 'express'
import { emptySchema } from '../../shared/fields.ts'
import { guardianRestrictionSchema, guardianSchema } from '../../shared/guardians.ts'
import { notFound } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, ifMatchOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { guardianPolicies } from '../policies/guardians.ts'
import { presentGuardian } from '../presenters/guardians.ts'
import { listGuardians } from '../queries/guardians.ts'
import { recordChildRead } from '../services/audit.ts'
import { inviteGuardian } from '../services/guardianInvitations.ts'
import { addGuardian, changeGuardian, restrictGuardian } from '../services/guardians.ts'
import { answerStale } from '../services/versions.ts'
import type { RouteSettings } from './all.ts'

const base = '/children/:childId/guardians'

export const guardianRoutes = ({ appUrl }: RouteSettings): Router => {
  const router = Router()
  const idOf = (req: Request) => String(req.params.guardianId)

  const show = async (req: Request, id: string) => {
    const access = accessOf(req)
    const [row] = await listGuardians(access, id)
    if (!row) throw notFound()
    return presentGuardian(row, access)
  }

  router.get(base, allow(guardianPolicies.list), async (req, res) => {
    const access = accessOf(req)
    const rows = await listGuardians(access)
    await recordChildRead(req.actor, access, 'guardian.listed', {
      detail: { ids: rows.map((row) => row.id) },
    })
    res.json(rows.map((row) => presentGuardian(row, access)))
  })

  router.post(base, allow(guardianPolicies.add), async (req, res) => {
    const details = await bodyOf(req, guardianSchema)
    const id = await addGuardian(req.actor, accessOf(req), details, idempotencyKeyOf(req))
    res.status(201).json(await show(req, id))
  })

  router.put(`${base}/:guardianId`, allow(guardianPolicies.change), async (req, res) => {
    const version = ifMatchOf(req)
    const details = await bodyOf(req, guardianSchema)
    await answerStale(changeGuardian(req.actor, accessOf(req), idOf(req), version, details), async () => {
      const guardian = await show(req, idOf(req))
      await recordChildRead(req.actor, accessOf(req), 'guardian.read', {
        objectType: 'guardian',
        objectId: guardian.id,
      })
      return guardian
    })
    res.json(await show(req, idOf(req)))
  })

  router.post(`${base}/:guardianId/invite`, allow(guardianPolicies.invite), async (req, res) => {
    await bodyOf(req, emptySchema)
    await inviteGuardian(req.actor, accessOf(req), idOf(req), appUrl)
    res.status(204).end()
  })

  router.post(`${base}/:guardianId/restrict`, allow(guardianPolicies.restrict), async (req, res) => {
    const restriction = await bodyOf(req, guardianRestrictionSchema)
    await restrictGuardian(req.actor, accessOf(req), idOf(req), restriction)
    res.status(204).end()
  })

  return router
}
