import { Router, type Request } from 'express'
import {
  letterApprovalSchema,
  letterDraftSchema,
  letterReturnSchema,
  letterSendSchema,
  letterStates,
  newLetterSchema,
  type LetterDraft,
} from '../../shared/letters.ts'
import { conflict, forbidden } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import {
  bodyOf,
  idempotencyKeyOf,
  ifMatchOf,
  pageOf,
  queryChoice,
  queryText,
} from '../middleware/requestBody.ts'
import { accessOf, viewerOf } from '../middleware/requestContext.ts'
import {
  canApproveLetter,
  canChangeLetter,
  canDiscardLetter,
  canRecallLetter,
  canReturnLetter,
  canSendLetter,
  canSubmitLetter,
  canTakeBackLetter,
  letterPolicies,
  letterRefusal,
  type LetterRule,
} from '../policies/letters.ts'
import { presentLetter, presentLetterRow } from '../presenters/letters.ts'
import { presentPage } from '../presenters/pages.ts'
import {
  findLetter,
  findLetterPdf,
  listDeliveries,
  listLettersOfChild,
  listLettersOfViewer,
  listRecipients,
  type LetterRecord,
} from '../queries/letters.ts'
import { recordAudit, recordChildRead } from '../services/audit.ts'
import { approveLetter, checkLetterText } from '../services/letterApproval.ts'
import { recallLetter, retryDelivery, sendLetter } from '../services/letterSending.ts'
import {
  changeLetter,
  createProgressLetter,
  discardLetter,
  returnLetter,
  submitLetter,
  takeBackLetter,
} from '../services/letters.ts'
import { answerStale } from '../services/versions.ts'

const base = '/children/:childId/letters'

/** The letter of the address, for a step that this person may take now; otherwise 403 or 409. */
const letterFor = async (req: Request, may?: LetterRule): Promise<LetterRecord> => {
  const access = accessOf(req)
  const letter = await findLetter(access, String(req.params.letterId))
  const refusal = may ? letterRefusal(access, letter, may) : null
  if (refusal === 'forbidden') throw forbidden('This step belongs to the author of the letter.')
  if (refusal === 'closed')
    throw conflict('closed', 'In its present state this letter does not allow that step.', {
      version: letter.version,
      state: letter.state,
    })
  return letter
}

const answerWith = async (req: Request, letterId: string) => {
  const access = accessOf(req)
  const letter = await findLetter(access, letterId)
  const [checks, recipients, deliveries] = await Promise.all([
    checkLetterText(access, letter, letter.content),
    listRecipients(access),
    listDeliveries(access, letter.id),
  ])
  return presentLetter(letter, access, { checks, recipients, deliveries })
}

const readLetter = async (req: Request) => {
  const view = await answerWith(req, String(req.params.letterId))
  await recordChildRead(req.actor, accessOf(req), 'letter.read', { objectType: 'letter', objectId: view.id })
  return view
}

/** Waits for an act on the letter of the address and shows what it is now. */
const answerAct = async (req: Request, act: Promise<unknown>) => {
  await answerStale(act, () => readLetter(req))
  return answerWith(req, String(req.params.letterId))
}

export const letterRoutes = ({ appUrl }: { appUrl: string }): Router => {
  const router = Router()

  router.get('/letters', allow(letterPolicies.listAll), async (req, res) => {
    const request = pageOf(req)
    const page = await listLettersOfViewer(viewerOf(req), {
      ...request,
      state: queryChoice(req, 'state', letterStates),
      search: queryText(req, 'search'),
    })
    await recordAudit(req.actor, { action: 'letters.list', detail: { ids: page.rows.map((row) => row.id) } })
    res.json(presentPage(page, request, presentLetterRow))
  })

  router.get(base, allow(letterPolicies.list), async (req, res) => {
    const request = pageOf(req)
    const page = await listLettersOfChild(accessOf(req), request)
    await recordChildRead(req.actor, accessOf(req), 'letters.listOfChild', {
      detail: { ids: page.rows.map((row) => row.id) },
    })
    res.json(presentPage(page, request, presentLetterRow))
  })

  router.post(base, allow(letterPolicies.create), async (req, res) => {
    await bodyOf(req, newLetterSchema)
    const id = await createProgressLetter(req.actor, accessOf(req), idempotencyKeyOf(req))
    res.status(201).json(await answerWith(req, id))
  })

  router.get(`${base}/:letterId`, allow(letterPolicies.read), async (req, res) => {
    res.json(await readLetter(req))
  })

  router.put(`${base}/:letterId`, allow(letterPolicies.change), async (req, res) => {
    const version = ifMatchOf(req)
    const draft = (await bodyOf(req, letterDraftSchema)) as LetterDraft
    const letter = await letterFor(req, canChangeLetter)
    res.json(await answerAct(req, changeLetter(req.actor, accessOf(req), letter, version, draft)))
  })

  router.delete(`${base}/:letterId`, allow(letterPolicies.change), async (req, res) => {
    const version = ifMatchOf(req)
    const letter = await letterFor(req, canDiscardLetter)
    await answerStale(discardLetter(req.actor, accessOf(req), letter, version), () => readLetter(req))
    res.status(204).end()
  })

  router.post(`${base}/:letterId/check`, allow(letterPolicies.check), async (req, res) => {
    const draft = (await bodyOf(req, letterDraftSchema)) as LetterDraft
    res.json(await checkLetterText(accessOf(req), await letterFor(req), draft))
  })

  router.post(`${base}/:letterId/submit`, allow(letterPolicies.change), async (req, res) => {
    const version = ifMatchOf(req)
    const letter = await letterFor(req, canSubmitLetter)
    res.json(await answerAct(req, submitLetter(req.actor, accessOf(req), letter, version)))
  })

  router.post(`${base}/:letterId/approve`, allow(letterPolicies.approve), async (req, res) => {
    const version = ifMatchOf(req)
    const approval = await bodyOf(req, letterApprovalSchema)
    const letter = await letterFor(req, canApproveLetter)
    res.json(await answerAct(req, approveLetter(req.actor, accessOf(req), letter, version, approval)))
  })

  router.post(`${base}/:letterId/return`, allow(letterPolicies.return), async (req, res) => {
    const version = ifMatchOf(req)
    const request = await bodyOf(req, letterReturnSchema)
    const letter = await letterFor(req, canReturnLetter)
    res.json(await answerAct(req, returnLetter(req.actor, accessOf(req), letter, version, request)))
  })

  router.post(`${base}/:letterId/take-back`, allow(letterPolicies.change), async (req, res) => {
    const version = ifMatchOf(req)
    const letter = await letterFor(req, canTakeBackLetter)
    res.json(await answerAct(req, takeBackLetter(req.actor, accessOf(req), letter, version)))
  })

  router.post(`${base}/:letterId/send`, allow(letterPolicies.send), async (req, res) => {
    const version = ifMatchOf(req)
    const { guardianIds } = await bodyOf(req, letterSendSchema)
    const letter = await letterFor(req, canSendLetter)
    res.json(await answerAct(req, sendLetter(req.actor, accessOf(req), letter, version, guardianIds, appUrl)))
  })

  router.post(`${base}/:letterId/recall`, allow(letterPolicies.send), async (req, res) => {
    const version = ifMatchOf(req)
    const letter = await letterFor(req, canRecallLetter)
    res.json(await answerAct(req, recallLetter(req.actor, accessOf(req), letter, version)))
  })

  router.get(`${base}/:letterId/pdf`, allow(letterPolicies.read), async (req, res) => {
    const letter = await letterFor(req)
    const { pdf } = await findLetterPdf(accessOf(req), letter.id)
    await recordChildRead(req.actor, accessOf(req), 'letter.pdf', {
      objectType: 'letter',
      objectId: letter.id,
    })
    res.type('application/pdf').setHeader('Content-Disposition', 'inline; filename="letter.pdf"')
    res.send(pdf)
  })

  router.post(
    `${base}/:letterId/deliveries/:deliveryId/retry`,
    allow(letterPolicies.retry),
    async (req, res) => {
      const letter = await letterFor(req)
      await retryDelivery(req.actor, accessOf(req), letter, String(req.params.deliveryId))
      res.json(await answerWith(req, letter.id))
    },
  )

  return router
}
