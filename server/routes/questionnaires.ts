import { Router, type Request } from 'express'
import { body } from '../../shared/fields.ts'
import {
  questionnaireDraftSchema,
  questionnaireStartSchema,
  type QuestionnaireDraft,
} from '../../shared/questionnaires.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, ifMatchOf } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { questionnairePolicies } from '../policies/questionnaires.ts'
import { presentQuestionnaire } from '../presenters/questionnaires.ts'
import { findQuestionnaire } from '../queries/questionnaires.ts'
import { recordChildRead } from '../services/audit.ts'
import {
  discardQuestionnaire,
  lockQuestionnaire,
  saveQuestionnaire,
  startQuestionnaire,
} from '../services/questionnaires.ts'
import { answerStale } from '../services/versions.ts'

const base = '/children/:childId/questionnaires'
const nothing = body({})

const idOf = (req: Request) => String(req.params.questionnaireId)

const view = async (req: Request, id: string) =>
  presentQuestionnaire(await findQuestionnaire(accessOf(req), id), accessOf(req))

const viewForReading = async (req: Request, id: string) => {
  const shown = await view(req, id)
  await recordChildRead(req.actor, accessOf(req), 'questionnaire.read', {
    objectType: 'questionnaire',
    objectId: id,
  })
  return shown
}

export const questionnaireRoutes = (): Router => {
  const router = Router()

  router.post(base, allow(questionnairePolicies.start), async (req, res) => {
    const start = await bodyOf(req, questionnaireStartSchema)
    const id = await startQuestionnaire(req.actor, accessOf(req), start, idempotencyKeyOf(req))
    res.status(201).json(await view(req, id))
  })

  router.get(`${base}/:questionnaireId`, allow(questionnairePolicies.read), async (req, res) => {
    res.json(await viewForReading(req, idOf(req)))
  })

  router.put(`${base}/:questionnaireId`, allow(questionnairePolicies.change), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    const draft: QuestionnaireDraft = await bodyOf(req, questionnaireDraftSchema)
    const saved = await answerStale(saveQuestionnaire(req.actor, accessOf(req), id, version, draft), () =>
      viewForReading(req, id),
    )
    res.json(presentQuestionnaire(saved, accessOf(req)))
  })

  router.delete(`${base}/:questionnaireId`, allow(questionnairePolicies.discard), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    await answerStale(discardQuestionnaire(req.actor, accessOf(req), id, version), () =>
      viewForReading(req, id),
    )
    res.status(204).end()
  })

  router.post(`${base}/:questionnaireId/lock`, allow(questionnairePolicies.lock), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    await bodyOf(req, nothing)
    await answerStale(lockQuestionnaire(req.actor, accessOf(req), id, version), () => viewForReading(req, id))
    res.json(await view(req, id))
  })

  return router
}
