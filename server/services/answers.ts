import { addWorkingDays } from '../../shared/days.ts'
import type { AnswerDraft } from '../../shared/answerRequests.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { AnswerRequest } from '../entities/AnswerRequest.ts'
import { gone } from '../errors.ts'
import { findOwnRequest, lockRequest, type AnswerableRequest } from '../queries/answerRequests.ts'
import { execute } from '../queries/sql.ts'
import { lockAnswers, storeAnswers } from './answerStore.ts'
import { currentTherapist } from './assignments.ts'
import type { AuditFact } from './audit.ts'
import { clinicToday, readSettings } from './settings.ts'
import { addTask } from './tasks.ts'
import { transact } from './transact.ts'

/** Working days in which answers that came back are looked at (clinic rule). */
const daysToLook = 5

export const requestFact = (
  request: Pick<AnswerableRequest, 'id' | 'childId'>,
  action: string,
  relation: ChildRelation | null,
): AuditFact => ({
  action,
  objectType: 'answerRequest',
  objectId: request.id,
  childId: request.childId,
  relation,
})

const ended = () =>
  gone(
    'link_ended',
    'These questions are closed: your answers were sent, their time is over, or the clinic withdrew them. Please call the clinic if you would like to add something.',
  )

/** The viewer's own request while it can be answered; 410 once it is over, 404 for everybody else's. */
export const openOwnRequest = async (
  access: ChildAccess,
  id: string,
  tx?: Tx,
): Promise<AnswerableRequest> => {
  const request = await findOwnRequest(access, id, tx)
  if (!request.open) throw ended()
  return request
}

type Record = (fact: AuditFact) => void

/** Stores what was answered so far under the request's lock. Throws StaleWrite when another device was quicker. */
export const keepAnswers = async (
  tx: Tx,
  record: Record,
  request: AnswerableRequest,
  given: { version: number; draft: AnswerDraft; settings: ClinicSettings },
): Promise<void> => {
  await storeAnswers(tx, record, request, given)
  await execute(tx, 'UPDATE answer_requests SET savedAt = :now WHERE id = :id', {
    now: now(),
    id: request.id,
  })
}

/** Closes the answers and the request with them, and tells the therapist, else the lead. Once: the lock makes a twin wait and then fail. */
export const closeAnswers = async (
  tx: Tx,
  record: Record,
  request: AnswerableRequest,
  { version, settings }: { version: number; settings: ClinicSettings },
): Promise<void> => {
  await lockAnswers(tx, record, request, version)
  await tx.update(AnswerRequest, { id: request.id }, { answeredAt: now() })
  await addTask(tx, {
    childId: request.childId,
    kind: 'answers_back',
    text: 'Answers came back: look at them',
    dueOn: addWorkingDays(clinicToday(settings), daysToLook),
    assigneeId: await currentTherapist(tx, request.childId),
    otherwise: 'clinicLead',
  })
}

export const saveOwnAnswers = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  given: { version: number; draft: AnswerDraft },
): Promise<void> => {
  const settings = await readSettings()
  await transact(actor, async (tx, record) => {
    await lockRequest(tx, { id })
    const request = await openOwnRequest(access, id, tx)
    await keepAnswers(tx, record, request, { ...given, settings })
    record(requestFact(request, 'answerRequest.saved', access.relation))
  })
}

export const sendOwnAnswers = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> => {
  const settings = await readSettings()
  await transact(actor, async (tx, record) => {
    await lockRequest(tx, { id })
    const request = await openOwnRequest(access, id, tx)
    await closeAnswers(tx, record, request, { version, settings })
    record(requestFact(request, 'answerRequest.answered', access.relation))
  })
}
