import { requestDays, type AnswerRequestDetails } from '../../shared/answerRequests.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { AnswerRequest } from '../entities/AnswerRequest.ts'
import type { OutboxMessage } from '../entities/OutboxMessage.ts'
import { conflict, invalid } from '../errors.ts'
import {
  carerRefusal,
  noObservationConsent,
  notThisTeacher,
  reasonNotToWrite,
} from '../policies/answerRequests.ts'
import {
  findRequestToWriteAbout,
  listCarersToAsk,
  listTeachersToAsk,
  type RequestToWriteAbout,
} from '../queries/answerAddressees.ts'
import { isConsentGiven } from '../queries/childFacts.ts'
import { findForm } from '../queries/forms.ts'
import { lockChild } from '../queries/lockChild.ts'
import { findForChild } from '../queries/scope.ts'
import { execute, selectOne } from '../queries/sql.ts'
import { hashToken, newToken } from './accounts.ts'
import { sendAnswerMail } from './answerMail.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { forgetLink } from './outbox.ts'
import { requireConsent } from './recordRules.ts'
import { readSettings } from './settings.ts'
import { countHit } from './throttles.ts'
import { transact } from './transact.ts'
import { updateIfCurrent } from './versions.ts'

const fact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action: `answerRequest.${action}`,
  objectType: 'answerRequest',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

const checkForm = async (tx: Tx, { formId, answerer }: AnswerRequestDetails) => {
  if (formId === null) return
  const form = await findForm(formId, tx)
  if (!form || form.retiredAt !== null) throw invalid({ formId: 'Choose a form from the list' })
  if (!form.definition.informants.includes(answerer))
    throw invalid({ formId: 'This form is not made for the person you ask' })
}

const checkAddressee = async (tx: Tx, access: ChildAccess, asked: AnswerRequestDetails) => {
  if (asked.answerer === 'guardian') {
    const carer = (await listCarersToAsk(access, tx)).find(({ id }) => id === asked.guardianId)
    if (!carer) throw invalid({ guardianId: 'Choose a carer from the list' })
    const refusal = carerRefusal(carer, asked.byLink)
    if (refusal !== null) throw invalid({ guardianId: refusal })
    if (asked.byLink && !carer.verified && asked.addressConfirmed !== true)
      throw invalid({
        addressConfirmed:
          'Ask the carer first whether this is their address: whoever gets the link meets the questions',
      })
    return
  }
  if (!(await isConsentGiven(access, 'share_school_observation', tx)))
    throw conflict('consent_needed', noObservationConsent)
  if (!(await listTeachersToAsk(access, tx)).some(({ id }) => id === asked.teacherId))
    throw invalid({ teacherId: notThisTeacher })
}

const checkOnlyOne = async (tx: Tx, access: ChildAccess, asked: AnswerRequestDetails) => {
  const open = await selectOne(
    `SELECT id FROM answer_requests WHERE childId = :childId AND asks = :asks AND formId <=> :formId
       AND guardianId <=> :guardianId AND teacherId <=> :teacherId
       AND answeredAt IS NULL AND cancelledAt IS NULL AND expiresAt > :now LIMIT 1 FOR UPDATE`,
    {
      childId: access.childId,
      asks: asked.asks,
      formId: asked.formId,
      guardianId: asked.guardianId,
      teacherId: asked.teacherId,
      now: now(),
    },
    tx,
  )
  if (open)
    throw conflict('duplicate', 'This person has been asked for this already. Send a reminder instead.')
}

const standingOf = async (tx: Tx, id: string) => {
  const request = await findRequestToWriteAbout({ id }, tx)
  if (!request) throw new Error('A request that was just found is gone')
  return request
}

/** Asks one carer or one teacher for one form and writes to them. Answers the request's id. */
export const askForAnswers = async (
  actor: Actor,
  access: ChildAccess,
  asked: AnswerRequestDetails,
  { key, appUrl }: { key: string | null; appUrl: string },
): Promise<string> => {
  const settings = await readSettings()
  return transact(actor, (tx, record) => {
    const request = ['answerRequest', access.childId, asked]
    const factOf = (id: string): AuditFact => ({
      ...fact(access, 'created', id),
      ...(asked.byLink && { detail: { addressConfirmed: asked.addressConfirmed === true } }),
    })
    return createOnce(tx, actor, record, { key, request }, factOf, async (id) => {
      await lockChild(access, tx)
      await requireConsent(tx, access, 'assessment_treatment')
      await checkForm(tx, asked)
      await checkAddressee(tx, access, asked)
      await checkOnlyOne(tx, access, asked)
      await tx.insert(AnswerRequest, {
        id,
        childId: access.childId,
        asks: asked.asks,
        formId: asked.formId,
        answerer: asked.answerer,
        guardianId: asked.guardianId,
        teacherId: asked.teacherId,
        // Replaced at once by the hash of the token that goes out.
        tokenHash: asked.byLink ? hashToken(newToken()) : null,
        askedAt: now(),
        askedById: access.viewer.id,
        expiresAt: new Date(now().getTime() + requestDays * 86_400_000),
        reminders: 0,
        remindedAt: null,
        savedAt: null,
        mailId: null,
        answeredAt: null,
        cancelledAt: null,
        cancelledWhy: null,
        wrongDates: 0,
      })
      await sendAnswerMail(tx, await standingOf(tx, id), {
        kind: 'ask',
        settings,
        appUrl,
        sentById: access.viewer.id,
      })
    })
  })
}

const isOver = ({ answeredAt, cancelledAt, expiresAt }: AnswerRequest) =>
  answeredAt !== null || cancelledAt !== null || expiresAt <= now()

/** Withdraws a request: its link ends and what is queued stays here. Throws StaleWrite. */
export const cancelRequest = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const request = await findForChild(access, AnswerRequest, id, tx, { lock: true })
    if (isOver(request))
      throw conflict(
        'closed',
        'This was answered, withdrawn before, or its time is over. Nothing was changed.',
      )
    await updateIfCurrent(tx, AnswerRequest, id, version, { cancelledAt: now() })
    await execute(
      tx,
      `UPDATE outbox_messages SET state = 'cancelled', problem = 'The request was withdrawn', ${forgetLink}
       WHERE id = :mailId AND state = 'queued'`,
      { mailId: request.mailId },
    )
    record(fact(access, 'cancelled', id))
  })

const remindersAnHour = 3
const restMs = 86_400_000

/** Was an e-mail sent, or something saved, in the last day? One that could not be delivered reached nobody. */
const heardLately = async (tx: Tx, request: RequestToWriteAbout): Promise<boolean> => {
  const since = now().getTime() - restMs
  if (request.savedAt !== null && request.savedAt.getTime() > since) return true
  const lastMailAt = request.remindedAt ?? request.askedAt
  if (request.mailId === null || lastMailAt.getTime() <= since) return false
  const mail = await selectOne<{ state: OutboxMessage['state'] }>(
    'SELECT m.state FROM outbox_messages m WHERE m.id = :mailId',
    { mailId: request.mailId },
    tx,
  )
  return mail !== null && mail.state !== 'failed' && mail.state !== 'cancelled'
}

/**
 * Writes once more to the person who was asked. Refused (409) when they may not be written to any more, and while an
 * e-mail or an answer of theirs is less than a day old: the link they have goes on working.
 */
export const remindByHand = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  appUrl: string,
): Promise<void> => {
  await findForChild(access, AnswerRequest, id)
  await countHit(`answer-reminder:${id}`, remindersAnHour, 3600)
  const settings = await readSettings()
  await transact(actor, async (tx, record) => {
    await findForChild(access, AnswerRequest, id, tx, { lock: true })
    const request = await standingOf(tx, id)
    const refusal = reasonNotToWrite(request)
    if (refusal !== null) throw conflict('closed', refusal)
    if (await heardLately(tx, request))
      throw conflict(
        'reminded_lately',
        'They had an e-mail, or saved answers, less than a day ago. What they have still works: give them a day ' +
          'before you remind them.',
      )
    await sendAnswerMail(tx, request, { kind: 'remind', settings, appUrl, sentById: access.viewer.id })
    record(fact(access, 'reminded', id))
  })
}
