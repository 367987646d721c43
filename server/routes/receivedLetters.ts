import { Router } from 'express'
import { gone, notFound } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import { viewerOf } from '../middleware/requestContext.ts'
import { familyPolicies, isLinkOpen, isLinkOver } from '../policies/family.ts'
import { presentReceivedLetter } from '../presenters/receivedLetters.ts'
import { findOwnDelivery, findReceivedLetter, findReceivedPdf } from '../queries/receivedLetters.ts'
import { now } from '../clock.ts'
import { recordAudit } from '../services/audit.ts'
import { recordLetterRead } from '../services/receivedLetters.ts'
import { readSettings } from '../services/settings.ts'

/** Letters as their addressee reads them. */
export const receivedLetterRoutes = (): Router => {
  const router = Router()

  router.get('/my/letters/:letterId', allow(familyPolicies.letter), async (req, res) => {
    const letter = await findReceivedLetter(viewerOf(req), String(req.params.letterId))
    const clinic = await readSettings()
    await recordLetterRead(req.actor, letter, 'text')
    res.json(presentReceivedLetter(letter, clinic))
  })

  router.get('/my/letters/:letterId/pdf', allow(familyPolicies.letterPdf), async (req, res) => {
    const viewer = viewerOf(req)
    const letter = await findReceivedLetter(viewer, String(req.params.letterId))
    const pdf = await findReceivedPdf(viewer, letter.deliveryId)
    await recordLetterRead(req.actor, letter, 'pdf')
    res.type('application/pdf').setHeader('Content-Disposition', 'attachment; filename="letter.pdf"')
    res.send(pdf)
  })

  router.get('/my/deliveries/:deliveryId', allow(familyPolicies.delivery), async (req, res) => {
    const delivery = await findOwnDelivery(viewerOf(req), String(req.params.deliveryId))
    if (isLinkOver(delivery, now()))
      throw gone('link_ended', 'This link has ended. Letters you can read are on your child’s page.')
    if (!isLinkOpen(delivery)) throw notFound()
    await recordAudit(req.actor, {
      action: 'letter.link_followed',
      objectType: 'letter',
      objectId: delivery.letterId,
      childId: delivery.childId,
      relation: 'guardian',
      detail: { deliveryId: delivery.id },
    })
    res.json({ letterId: delivery.letterId, childId: delivery.childId })
  })

  return router
}
