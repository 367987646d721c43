import { randomUUID } from 'node:crypto'
import type { AnswerDraft } from '../../shared/answerRequests.ts'
import type { FormAnswers } from '../../shared/forms.ts'
import { cutOffSetById, scoreHandUse } from '../../shared/handUse.ts'
import { historyDetailsSchema, type HistoryDetails } from '../../shared/histories.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { History } from '../entities/History.ts'
import { QuestionnaireResponse } from '../entities/QuestionnaireResponse.ts'
import { conflict, invalid } from '../errors.ts'
import { findAskedForm, type AnswerableRequest, type StoredForm } from '../queries/answerRequests.ts'
import type { AuditFact } from './audit.ts'
import { beginHistory, lockHistory, saveHistory } from './histories.ts'
import { clinicToday } from './settings.ts'
import { StaleWrite, updateIfCurrent } from './versions.ts'

type Record = (fact: AuditFact) => void

const formOf = async (request: AnswerableRequest, tx: Tx): Promise<StoredForm> => {
  const form = request.formId === null ? null : await findAskedForm(request.formId, tx)
  if (!form) throw new Error('A request asks for a form that is not there')
  return form
}

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

/** Answers of another form, or none at all, are a fault of the page: it is told beside the answers. */
const checkAnswers = (form: StoredForm, answers: FormAnswers | undefined): FormAnswers => {
  if (answers === undefined) throw invalid({ answers: 'The answers are missing' })
  const { items, options } = form.definition
  const known = new Set(items.map(({ id }) => id))
  const fields: { [path: string]: string } = {}
  for (const [id, answer] of Object.entries(answers)) {
    if (!known.has(id)) fields[`answers.${id}`] = 'This form has no such activity'
    else if (answer !== null && !options.includes(answer))
      fields[`answers.${id}`] = 'Choose one of the answers of this form'
  }
  for (const id of known) if (!(id in answers)) fields[`answers.${id}`] = 'This activity is missing'
  if (Object.keys(fields).length > 0) throw invalid(fields)
  return answers
}

const storeResponse = async (tx: Tx, request: AnswerableRequest, given: Given) => {
  const { version, draft, settings } = given
  const form = await formOf(request, tx)
  const answers = checkAnswers(form, draft.answers)
  const kept = await rowOf(QuestionnaireResponse, request, tx)
  const patch = { answers, comment: draft.comment ?? null, answeredOn: clinicToday(settings) }
  if (kept) return updateIfCurrent(tx, QuestionnaireResponse, kept.id, version, patch)
  if (version !== 0) throw new StaleWrite()
  const id = randomUUID()
  await tx.insert(QuestionnaireResponse, {
    id,
    childId: request.childId,
    formVersion: form.id,
    informant: request.answerer,
    respondentName: request.askedOf,
    ...patch,
    cutOffSet: settings.cutOffSet,
    score: null,
    lockedAt: null,
    lockedById: null,
    requestId: request.id,
    guardianId: request.guardianId,
    startedById: request.userId,
    replacesId: null,
    createdAt: now(),
  })
}

const storeHistory = async (tx: Tx, record: Record, request: AnswerableRequest, given: Given) => {
  const { draft, version, settings } = given
  if (draft.history === undefined) throw invalid({ history: 'The answers are missing' })
  const details = await checkHistory(draft.history)
  let kept = await rowOf(History, request, tx)
  if (!kept) {
    if (version !== 0) throw new StaleWrite()
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
  } else if (version !== kept.version) throw new StaleWrite()
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
  request.asks === 'history' ? storeHistory(tx, record, request, given) : storeResponse(tx, request, given)

const nothingAnswered = () =>
  invalid({ answers: 'Nothing is answered yet. “Does not do this yet” is an answer too.' })

/** Closes the answers for good. Throws StaleWrite, and 422 when nothing was answered. */
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
  if (!kept || Object.values(kept.answers).every((answer) => answer === null)) throw nothingAnswered()
  const cutOffs = cutOffSetById(kept.cutOffSet)
  if (!cutOffs) throw conflict('closed', 'unknown cut-offs')
  await updateIfCurrent(tx, QuestionnaireResponse, kept.id, version, {
    score: { ...scoreHandUse(kept.answers, cutOffs), method: 'edinburgh_style', total: null },
    lockedAt: now(),
    lockedById: request.userId,
  })
}
