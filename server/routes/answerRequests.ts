import { Router, type Request } from 'express'
import {
  answerDraftSchema,
  answerRequestSchema,
  type AnswerRequestPage,
} from '../../shared/answerRequests.ts'
import { emptySchema } from '../../shared/fields.ts'
import { now } from '../clock.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, ifMatchOf, pageOf } from '../middleware/requestBody.ts'
import { accessOf, viewerOf } from '../middleware/requestContext.ts'
import type { ChildPolicy, RolePolicy } from '../policies/policy.ts'
import { answerRequestPolicies as policies } from '../policies/answerRequests.ts'
import {
  presentAnswerChoices,
  presentAnswerPage,
  presentAnswerRequest,
  presentToAnswer,
} from '../presenters/answerRequests.ts'
import { presentPage } from '../presenters/pages.ts'
import { listCarersToAsk, listTeachersToAsk } from '../queries/answerAddressees.ts'
import { findAnswerRequest, listAnswerRequests, listToAnswer } from '../queries/answerRequests.ts'
import { findKeptAnswers } from '../queries/answers.ts'
import { isConsentGiven } from '../queries/childFacts.ts'
import { listForms } from '../queries/forms.ts'
import { askForAnswers, cancelRequest, remindByHand } from '../services/answerRequests.ts'
import { openOwnRequest, requestFact, saveOwnAnswers, sendOwnAnswers } from '../services/answers.ts'
import { recordAudit, recordChildRead } from '../services/audit.ts'
import { readSettings } from '../services/settings.ts'
import { answerStale } from '../services/versions.ts'
import type { RouteSettings } from './all.ts'

const base = '/children/:childId/answer-requests'
const idOf = (req: Request) => String(req.params.requestId)

/** The clinic asks. */
const askingRoutes = (router: Router, { appUrl }: RouteSettings): void => {
  const show = async (req: Request, id: string) => {
    const access = accessOf(req)
    return presentAnswerRequest(await findAnswerRequest(access, id), access, now())
  }

  router.get(base, allow(policies.list), async (req, res) => {
    const access = accessOf(req)
    const page = pageOf(req)
    const requests = await listAnswerRequests(access, page)
    await recordChildRead(req.actor, access, 'answerRequest.listed', {
      detail: { ids: requests.rows.map(({ id }) => id) },
    })
    const shown = presentPage(requests, page, (row) => presentAnswerRequest(row, access, now()))
    const body: AnswerRequestPage = { ...shown, waiting: requests.waiting }
    res.json(body)
  })

  router.get('/children/:childId/answer-choices', allow(policies.choices), async (req, res) => {
    const access = accessOf(req)
    const [consented, observationShared, forms, carers, teachers] = await Promise.all([
      isConsentGiven(access, 'assessment_treatment'),
      isConsentGiven(access, 'share_school_observation'),
      listForms(),
      listCarersToAsk(access),
      listTeachersToAsk(access),
    ])
    await recordChildRead(req.actor, access, 'answerRequest.choices', {
      detail: { ids: carers.map(({ id }) => id) },
    })
    res.json(presentAnswerChoices({ consented, observationShared, forms, carers, teachers }))
  })

  router.post(base, allow(policies.create), async (req, res) => {
    const asked = await bodyOf(req, answerRequestSchema)
    const id = await askForAnswers(req.actor, accessOf(req), asked, {
      key: idempotencyKeyOf(req),
      appUrl,
    })
    res.status(201).json(await show(req, id))
  })

  router.post(`${base}/:requestId/cancel`, allow(policies.cancel), async (req, res) => {
    const version = ifMatchOf(req)
    await bodyOf(req, emptySchema)
    await answerStale(cancelRequest(req.actor, accessOf(req), idOf(req), version), async () => {
      const current = await show(req, idOf(req))
      await recordChildRead(req.actor, accessOf(req), 'answerRequest.read', {
        objectType: 'answerRequest',
        objectId: current.id,
      })
      return current
    })
    res.status(204).end()
  })

  router.post(`${base}/:requestId/remind`, allow(policies.remind), async (req, res) => {
    await bodyOf(req, emptySchema)
    await remindByHand(req.actor, accessOf(req), idOf(req), appUrl)
    res.status(204).end()
  })
}

interface AnswerSide {
  relation: 'guardian' | 'teacher'
  list: string
  page: string
  policies: { list: RolePolicy; read: ChildPolicy; save: ChildPolicy; send: ChildPolicy }
}

/** One person answers what they were asked, signed in. */
const answeringRoutes = (router: Router, side: AnswerSide): void => {
  const page = async (req: Request) => {
    const request = await openOwnRequest(accessOf(req), idOf(req))
    const [kept, clinic] = await Promise.all([findKeptAnswers(request), readSettings()])
    return presentAnswerPage(request, kept, clinic)
  }
  const pageForReading = async (req: Request) => {
    const shown = await page(req)
    const { childId, relation } = accessOf(req)
    await recordAudit(
      req.actor,
      requestFact({ id: shown.requestId, childId }, 'answerRequest.page', relation),
    )
    return shown
  }

  router.get(side.list, allow(side.policies.list), async (req, res) => {
    const rows = await listToAnswer(viewerOf(req), side.relation)
    const { timeZone } = await readSettings()
    await recordAudit(req.actor, {
      action: 'answerRequest.toAnswer',
      relation: side.relation,
      detail: { ids: rows.map(({ id }) => id) },
    })
    res.json(rows.map((row) => presentToAnswer(row, timeZone)))
  })

  router.get(side.page, allow(side.policies.read), async (req, res) => {
    res.json(await pageForReading(req))
  })

  router.put(side.page, allow(side.policies.save), async (req, res) => {
    const version = ifMatchOf(req)
    const draft = await bodyOf(req, answerDraftSchema)
    await answerStale(saveOwnAnswers(req.actor, accessOf(req), idOf(req), { version, draft }), () =>
      pageForReading(req),
    )
    res.json(await page(req))
  })

  router.post(`${side.page}/send`, allow(side.policies.send), async (req, res) => {
    const version = ifMatchOf(req)
    await bodyOf(req, emptySchema)
    await answerStale(sendOwnAnswers(req.actor, accessOf(req), idOf(req), version), () => pageForReading(req))
    res.status(204).end()
  })
}

export const answerRequestRoutes = (settings: RouteSettings): Router => {
  const router = Router()
  askingRoutes(router, settings)
  answeringRoutes(router, {
    relation: 'guardian',
    list: '/my/to-answer',
    page: '/my/children/:childId/answer-requests/:requestId',
    policies: {
      list: policies.toAnswerAsCarer,
      read: policies.readAsCarer,
      save: policies.saveAsCarer,
      send: policies.sendAsCarer,
    },
  })
  answeringRoutes(router, {
    relation: 'teacher',
    list: '/pupils/to-answer',
    page: '/pupils/:childId/answer-requests/:requestId',
    policies: {
      list: policies.toAnswerAsTeacher,
      read: policies.readAsTeacher,
      save: policies.saveAsTeacher,
      send: policies.sendAsTeacher,
    },
  })
  return router
}
