import { Router, type Request } from 'express'
import { guardianConsentSchema, guardianWithdrawalSchema } from '../../shared/consents.ts'
import { ownContactSchema } from '../../shared/guardians.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, ifMatchOf } from '../middleware/requestBody.ts'
import { accessOf, viewerOf } from '../middleware/requestContext.ts'
import { familyPolicies } from '../policies/family.ts'
import { presentOwnChild, presentOwnChildRow, presentOwnContact } from '../presenters/family.ts'
import { findOwnChild, listConsentsInForce, listGoalWords, listOwnChildren } from '../queries/family.ts'
import { listReceivedLetters } from '../queries/receivedLetters.ts'
import { recordAudit, recordChildRead } from '../services/audit.ts'
import { changeOwnContact, giveOwnConsent, withdrawOwnConsent } from '../services/family.ts'
import { readSettings } from '../services/settings.ts'
import { answerStale } from '../services/versions.ts'

const base = '/my/children/:childId'

const ownChild = async (req: Request) => {
  const access = accessOf(req)
  const child = await findOwnChild(access)
  const [letters, consents, goals, clinic] = await Promise.all([
    listReceivedLetters(access),
    listConsentsInForce(access),
    listGoalWords(access),
    readSettings(),
  ])
  return presentOwnChild(child, { letters, consents, goals }, clinic)
}

/** A parent's or carer's own side: their children, their own contact row, their choices. */
export const familyRoutes = (): Router => {
  const router = Router()

  router.get('/my/children', allow(familyPolicies.children), async (req, res) => {
    const children = await listOwnChildren(viewerOf(req))
    await recordAudit(req.actor, {
      action: 'family.children',
      relation: 'guardian',
      detail: { ids: children.map((child) => child.id) },
    })
    res.json(children.map(presentOwnChildRow))
  })

  router.get(base, allow(familyPolicies.child), async (req, res) => {
    const view = await ownChild(req)
    await recordChildRead(req.actor, accessOf(req), 'family.child')
    res.json(view)
  })

  router.put(`${base}/contact`, allow(familyPolicies.changeContact), async (req, res) => {
    const access = accessOf(req)
    const version = ifMatchOf(req)
    const contact = await bodyOf(req, ownContactSchema)
    await answerStale(changeOwnContact(req.actor, access, version, contact), async () => {
      const child = await findOwnChild(access)
      await recordChildRead(req.actor, access, 'family.child')
      return presentOwnContact(child)
    })
    res.json(await ownChild(req))
  })

  router.post(`${base}/consents`, allow(familyPolicies.giveConsent), async (req, res) => {
    const { purpose } = await bodyOf(req, guardianConsentSchema)
    await giveOwnConsent(req.actor, accessOf(req), purpose, idempotencyKeyOf(req))
    res.status(204).end()
  })

  router.post(
    `${base}/consents/:consentId/withdraw`,
    allow(familyPolicies.withdrawConsent),
    async (req, res) => {
      const { reason } = await bodyOf(req, guardianWithdrawalSchema)
      await withdrawOwnConsent(req.actor, accessOf(req), String(req.params.consentId), reason)
      res.status(204).end()
    },
  )

  return router
}
