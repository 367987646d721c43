import { addWorkingDays, dayOf, formatDay, type Day } from '../../shared/days.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { answersAsked, answersReminder } from '../mail/answerMails.ts'
import { reasonNotToWrite } from '../policies/answerRequests.ts'
import { findRequestToWriteAbout, type RequestToWriteAbout } from '../queries/answerAddressees.ts'
import { execute } from '../queries/sql.ts'
import { hashToken, newToken } from './accounts.ts'
import { currentTherapist } from './assignments.ts'
import { enqueueMail } from './outbox.ts'
import { addTask } from './tasks.ts'

interface AnswerMail {
  kind: 'ask' | 'remind'
  settings: ClinicSettings
  appUrl: string
  /** Who sends it; null for the job. */
  sentById: string | null
}

const linkTo = (request: RequestToWriteAbout, appUrl: string, token: string) => {
  if (request.byLink) return `${appUrl}/answer#${token}`
  return request.answerer === 'guardian'
    ? `${appUrl}/my-child/${request.childId}/answer/${request.id}`
    : `${appUrl}/classes/${request.classId}/pupils/${request.childId}/answer/${request.id}`
}

/**
 * Queues the e-mail that asks, in the transaction of the act. The secret of a link is kept as its hash only, so every
 * e-mail brings a link of its own and ends the one before.
 */
export const sendAnswerMail = async (
  tx: Tx,
  request: RequestToWriteAbout,
  { kind, settings, appUrl, sentById }: AnswerMail,
): Promise<void> => {
  if (request.email === null) throw new Error('A request without an address cannot be written about')
  const token = newToken()
  const write = kind === 'ask' ? answersAsked : answersReminder
  const mail = write({
    clinic: settings,
    link: linkTo(request, appUrl, token),
    answerBy: formatDay(dayOf(request.expiresAt, settings.timeZone)),
    byLink: request.byLink,
  })
  const mailId = await enqueueMail(
    tx,
    { kind: 'answer_request', recipient: request.email, ...mail },
    sentById,
  )
  const reminded = kind === 'remind'
  await execute(
    tx,
    `UPDATE answer_requests SET mailId = :mailId, tokenHash = IF(tokenHash IS NULL, NULL, :tokenHash),
       reminders = reminders + :more, remindedAt = IF(:more = 1, :now, remindedAt) WHERE id = :id`,
    { mailId, tokenHash: hashToken(token), more: reminded ? 1 : 0, now: now(), id: request.id },
  )
}

/**
 * Why a queued e-mail about a request must not leave after all, in words; null when it still may. Judged at the moment
 * of sending: answers, consent, restriction and address may have changed since.
 */
export const reasonNotToAsk = async (mail: { id: string; recipient: string }): Promise<string | null> => {
  const request = await findRequestToWriteAbout({ mailId: mail.id })
  if (!request) return 'A newer e-mail took its place'
  const reason = reasonNotToWrite(request)
  if (reason !== null) return reason
  return request.email === mail.recipient ? null : 'The address has changed since it was queued'
}

/** Tells the therapist that nobody was asked after all, in the transaction that says the e-mail failed. */
export const tellRequestFailed = async (tx: Tx, mailId: string, today: Day): Promise<void> => {
  const request = await findRequestToWriteAbout({ mailId }, tx)
  if (!request) return
  await addTask(tx, {
    childId: request.childId,
    kind: 'answer_request_failed',
    text: 'An e-mail with questions could not be delivered: check the address, then send a reminder',
    dueOn: addWorkingDays(today, 1),
    assigneeId: await currentTherapist(tx, request.childId),
    otherwise: 'clinicLead',
  })
}
