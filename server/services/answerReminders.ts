import { dueReminder, reminderDays, reminderRestDays } from '../../shared/answerRequests.ts'
import { addWorkingDays } from '../../shared/days.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import { systemActor } from '../access/actor.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { logger } from '../logger.ts'
import { reasonNotToWrite } from '../policies/answerRequests.ts'
import {
  findRequestToWriteAbout,
  listReminderCandidates,
  type RequestToWriteAbout,
} from '../queries/answerAddressees.ts'
import { lockRequest } from '../queries/answerRequests.ts'
import { sendAnswerMail } from './answerMail.ts'
import { currentTherapist } from './assignments.ts'
import { clinicToday, readSettings } from './settings.ts'
import { addTask } from './tasks.ts'
import { transact } from './transact.ts'

const daysAgo = (days: number) => new Date(now().getTime() - days * 86_400_000)

/** Working days in which the therapist looks at a request that a teacher left unanswered (clinic rule). */
const daysToAskAgain = 5

const due = (request: RequestToWriteAbout | null): number | null =>
  request === null || reasonNotToWrite(request) !== null ? null : dueReminder(request, now())

const tellTherapist = async (tx: Tx, childId: string, settings: ClinicSettings) =>
  addTask(tx, {
    childId,
    kind: 'teacher_unanswered',
    text: 'A teacher has not answered for 14 days: ask again, or call the school',
    dueOn: addWorkingDays(clinicToday(settings), daysToAskAgain),
    assigneeId: await currentTherapist(tx, childId),
    otherwise: 'clinicLead',
  })

const remind = (id: string, settings: ClinicSettings, appUrl: string): Promise<boolean> =>
  transact(systemActor(`reminder-${id}`), async (tx, record) => {
    await lockRequest(tx, { id })
    const request = await findRequestToWriteAbout({ id }, tx)
    const day = due(request)
    const fact = { objectType: 'answerRequest', objectId: id, childId: request?.childId ?? null }
    if (request === null || day === null) {
      // Another worker was quicker, or something changed since the list was read.
      record({ ...fact, action: 'answerRequest.reminder_not_needed' })
      return false
    }
    await sendAnswerMail(tx, request, { kind: 'remind', settings, appUrl, sentById: null })
    if (request.answerer === 'teacher' && day === reminderDays.at(-1))
      await tellTherapist(tx, request.childId, settings)
    record({ ...fact, action: 'answerRequest.reminded', detail: { day } })
    return true
  })

/**
 * Sends the reminders of day 7 and 14 that are due; answers how many. Safe to run twice and on several machines: each
 * is judged again under a lock on its request. One that fails does not hold up the next.
 */
export const sendDueReminders = async (appUrl: string): Promise<number> => {
  const candidates = await listReminderCandidates(daysAgo(reminderDays[0]), daysAgo(reminderRestDays))
  if (candidates.length === 0) return 0
  const settings = await readSettings()
  let sent = 0
  for (const { id } of candidates) {
    try {
      if (due(await findRequestToWriteAbout({ id })) === null) continue
      if (await remind(id, settings, appUrl)) sent += 1
    } catch (error) {
      logger.warn({ code: (error as { code?: string }).code }, 'a reminder could not be sent')
    }
  }
  return sent
}
