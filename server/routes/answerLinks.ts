import { Router, type Request } from 'express'
import {
  answerLinkDraftSchema,
  answerLinkSchema,
  answerLinkSendSchema,
  type AnswerLink,
} from '../../shared/answerRequests.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf } from '../middleware/requestBody.ts'
import { answerRequestPolicies } from '../policies/answerRequests.ts'
import { presentAnswerPage } from '../presenters/answerRequests.ts'
import type { AnswerableRequest } from '../queries/answerRequests.ts'
import { findKeptAnswers } from '../queries/answers.ts'
import { openLink, saveByLink, sendByLink, type LinkCall } from '../services/answerLinks.ts'
import { readSettings } from '../services/settings.ts'
import { answerStale } from '../services/versions.ts'

const callOf = (req: Request, { token, birthDate }: AnswerLink): LinkCall => ({
  actor: req.actor,
  link: { token, birthDate },
  address: req.ip ?? 'unknown',
})

const page = async (request: AnswerableRequest) => {
  const [kept, clinic] = await Promise.all([findKeptAnswers(request), readSettings()])
  return presentAnswerPage(request, kept, clinic)
}

/** A carer without a sign-in answers through the link of an e-mail. */
export const answerLinkRoutes = (): Router => {
  const router = Router()

  router.post('/answer-links/open', allow(answerRequestPolicies.openLink), async (req, res) => {
    const link = await bodyOf(req, answerLinkSchema)
    res.json(await page(await openLink(callOf(req, link))))
  })

  router.put('/answer-links', allow(answerRequestPolicies.saveByLink), async (req, res) => {
    const { version, answers, comment, history, ...link } = await bodyOf(req, answerLinkDraftSchema)
    const call = callOf(req, link)
    const request = await answerStale(
      saveByLink(call, { version, draft: { answers, comment, history } }),
      async () => page(await openLink(call)),
    )
    res.json(await page(request))
  })

  router.post('/answer-links/send', allow(answerRequestPolicies.sendByLink), async (req, res) => {
    const { version, ...link } = await bodyOf(req, answerLinkSendSchema)
    const call = callOf(req, link)
    await answerStale(sendByLink(call, version), async () => page(await openLink(call)))
    res.status(204).end()
  })

  return router
}
