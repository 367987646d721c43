import { randomUUID } from 'node:crypto'
import type { AnswerDraft } from '../../shared/answerRequests.ts'
import { historyDetailsSchema, type HistoryDetails } from '../../shared/histories.ts'
import { flagsInComment, type QuotedFlag } from '../../shared/redFlagWords.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import type { Tx } from '../dataSource.ts'
import { History } from '../entities/History.ts'
import { QuestionnaireResponse } from '../entities/QuestionnaireResponse.ts'
import { invalid } from '../errors.ts'
import type { AnswerableRequest } from '../queries/answerRequests.ts'
import type { AuditFact } from './audit.ts'
import { beginHistory, lockHistory, saveHistory } from './historyStore.ts'
import { beginRequestedResponse, lockResponse, saveAnswers } from './questionnaireStore.ts'
import { raiseWrittenFlags } from './redFlagWords.ts'
import { clinicToday } from './settings.ts'
import { StaleWrite } from './versions.ts'

type Record = (fact: AuditFact) => void

const rowOf = <E extends typeof History | typeof QuestionnaireResponse>(
  entity: E,
  request: AnswerableRequest,
  tx: Tx,
) =>
  tx
    .createQueryBuilder<InstanceType<E>>(entity, 'row')
    .where('row.requestId = :requestId AND row.childId = :childId', {
      requestId: request.id,
      childId: request.childId,
    })
    .setLock('pessimistic_write')
    .getOne()

interface Given {
  version: number
  draft: AnswerDraft
  settings: ClinicSettings
}

const storeResponse = async (tx: Tx, record: Record, request: AnswerableRequest, given: Given) => {
  const { version, draft, settings } = given
  const { formId } = request
  if (formId === null) throw new Error('A request for a questionnaire names no form')
  if (draft.answers === undefined) throw invalid({ answers: 'The answers are missing' })
  let kept = await rowOf(QuestionnaireResponse, request, tx)
  if (version !== (kept?.version ?? 0)) throw new StaleWrite()
  kept ??= await beginRequestedResponse(tx, {
    id: randomUUID(),
    childId: request.childId,
    formId,
    informant: request.answerer,
    respondentName: request.askedOf,
    answeredOn: clinicToday(settings),
    cutOffSet: settings.cutOffSet,
    requestId: request.id,
    guardianId: request.guardianId,
    startedById: request.userId,
  })
  // A save that names no comment leaves the stored one: null takes it away, absence does not.
  const comment = draft.comment === undefined ? kept.comment : draft.comment
  await saveAnswers(tx, kept, kept.version, {
    answers: draft.answers,
    comment,
    answeredOn: clinicToday(settings),
  })
  await raiseInComment(tx, record, request, kept.id, flagsInComment(comment, kept.comment))
}

const raiseInComment = (
  tx: Tx,
  record: Record,
  request: AnswerableRequest,
  originId: string,
  found: readonly QuotedFlag[],
): Promise<void> =>
  raiseWrittenFlags(tx, record, {
    childId: request.childId,
    origin: 'questionnaire',
    originId,
    found,
    writer: request.answerer === 'teacher' ? 'teacher' : 'family',
    raisedById: request.userId,
    relation: request.answerer,
  })

const storeHistory = async (tx: Tx, record: Record, request: AnswerableRequest, given: Given) => {
  const { draft, version, settings } = given
  if (draft.history === undefined) throw invalid({ history: 'The answers are missing' })
  const details = await checkHistory(draft.history)
  let kept = await rowOf(History, request, tx)
  if (version !== (kept?.version ?? 0)) throw new StaleWrite()
  if (!kept) {
    await beginHistory(tx, record, {
      childId: request.childId,
      informant: 'guardian',
      respondentName: request.askedOf,
      answeredOn: clinicToday(settings),
      requestId: request.id,
      guardianId: request.guardianId,
      startedById: request.userId,
      replacesId: null,
    })
    kept = await rowOf(History, request, tx)
  }
  if (!kept) throw new Error('A history that was just begun is gone')
  await saveHistory(tx, record, {
    history: kept,
    version: kept.version,
    details,
    answeredOn: clinicToday(settings),
    byId: request.userId,
    part: 'history',
  })
}

const checkHistory = async (given: unknown): Promise<HistoryDetails> => {
  await historyDetailsSchema.validate(given, { strict: true, abortEarly: false })
  return historyDetailsSchema.cast(given) as HistoryDetails
}

/** Stores what was answered so far. Throws StaleWrite when something newer is stored. */
export const storeAnswers = (
  tx: Tx,
  record: Record,
  request: AnswerableRequest,
  given: Given,
): Promise<void> =>
  request.asks === 'history'
    ? storeHistory(tx, record, request, given)
    : storeResponse(tx, record, request, given)

const nothingAnswered = () =>
  invalid({ answers: 'Nothing is answered yet. “Does not do this yet” is an answer too.' })

/** Closes the answers for good, with an entry of its own. Throws StaleWrite, and 422 when nothing was answered. */
export const lockAnswers = async (
  tx: Tx,
  record: Record,
  request: AnswerableRequest,
  version: number,
): Promise<void> => {
  if (request.asks === 'history') {
    const history = await rowOf(History, request, tx)
    if (!history) throw nothingAnswered()
    return lockHistory(tx, record, { history, version, lockedById: request.userId, part: 'history' })
  }
  const kept = await rowOf(QuestionnaireResponse, request, tx)
  if (!kept) throw nothingAnswered()
  await lockResponse(tx, kept, version, request.userId)
  record({
    action: 'questionnaire.locked',
    objectType: 'questionnaire',
    objectId: kept.id,
    childId: request.childId,
    relation: request.answerer,
  })
  await raiseInComment(tx, record, request, kept.id, flagsInComment(kept.comment))
}
