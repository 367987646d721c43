import type { Day } from '../../shared/days.ts'
import { answerProblems, blankAnswers, isBlank } from '../../shared/formAnswers.ts'
import { scoreForm } from '../../shared/formScores.ts'
import type { FormAnswers, FormScore } from '../../shared/forms.ts'
import { cutOffSetById, type CutOffSetId } from '../../shared/handUse.ts'
import type { Informant, QuestionnaireDraft, QuestionnaireStart } from '../../shared/questionnaires.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { QuestionnaireResponse } from '../entities/QuestionnaireResponse.ts'
import { conflict, invalid } from '../errors.ts'
import { findForm, type FormRecord } from '../queries/forms.ts'
import { findQuestionnaire, type QuestionnaireRecord } from '../queries/questionnaires.ts'
import { findForChild } from '../queries/scope.ts'
import { selectOne } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { requireConsent, requirePastDay } from './recordRules.ts'
import { readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { StaleWrite, updateIfCurrent } from './versions.ts'

const fact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action: `questionnaire.${action}`,
  objectType: 'questionnaire',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

const closed = () =>
  conflict(
    'closed',
    'This response is locked and stays as it is. To correct it, start a new one that replaces it.',
  )

/** The response for writing by staff; locked ones are refused here and, should this ever fail, by a trigger. */
const openResponse = async (tx: Tx, access: ChildAccess, id: string): Promise<QuestionnaireResponse> => {
  const response = await findForChild(access, QuestionnaireResponse, id, tx, { lock: true })
  if (response.lockedAt !== null) throw closed()
  if (response.requestId !== null)
    throw conflict(
      'asked',
      'These are the answers of the person who was asked. They alone can change and send them.',
    )
  return response
}

/** The edition a response was begun with; it stays answerable after it was retired. */
const formOf = async (tx: Tx, { formVersion }: Pick<QuestionnaireResponse, 'formVersion'>) => {
  const form = await findForm(formVersion, tx)
  if (!form) throw new Error('A response names a form that is not there')
  return form
}

const requireInformant = ({ definition }: FormRecord, informant: Informant): void => {
  if (!definition.informants.includes(informant))
    throw invalid({ informant: `“${definition.title}” is not answered by them. Choose somebody else.` })
}

/** The edition to begin with: known, in use, and meant for who answers. 422 beside the field otherwise. */
const formToBegin = async (tx: Tx, formId: string, informant: Informant): Promise<FormRecord> => {
  const form = await findForm(formId, tx)
  if (!form) throw invalid({ formId: 'Choose a form from the list' })
  if (form.retiredAt !== null)
    throw invalid({
      formId: 'This edition was retired. Choose another; what was begun with it can be finished.',
    })
  requireInformant(form, informant)
  return form
}

const checkReplaced = async (
  tx: Tx,
  access: ChildAccess,
  replacesId: string,
  form: FormRecord,
): Promise<void> => {
  const earlier = await findForChild(access, QuestionnaireResponse, replacesId, tx, { lock: true })
  if (earlier.lockedAt === null)
    throw conflict('not_locked', 'Only a locked response is replaced. This one can still be changed.')
  if ((await formOf(tx, earlier)).key !== form.key)
    throw invalid({
      formId: 'A response is replaced by one to the same form. Another form is a new response.',
    })
  // A locking read: the newest row counts, not the one this transaction saw first.
  const newer = await selectOne<{ id: string }>(
    'SELECT id FROM questionnaire_responses WHERE replacesId = :replacesId FOR UPDATE',
    { replacesId },
    tx,
  )
  if (newer)
    throw conflict('duplicate', 'A response that replaces this one was already begun. Open that one.')
}

interface BegunResponse {
  id: string
  childId: string
  form: FormRecord
  informant: Informant
  respondentName: string | null
  answeredOn: Day
  /** The clinic's choice, for forms without bounds of their own. */
  cutOffSet: CutOffSetId
  requestId: string | null
  guardianId: string | null
  startedById: string | null
  replacesId: string | null
}

const insertResponse = async (tx: Tx, { form, cutOffSet, ...begun }: BegunResponse): Promise<void> => {
  await tx.insert(QuestionnaireResponse, {
    ...begun,
    formVersion: form.id,
    answers: blankAnswers(form.definition),
    comment: null,
    cutOffSet: form.definition.cutOffSet ?? cutOffSet,
    score: null,
    lockedAt: null,
    lockedById: null,
    createdAt: now(),
  })
}

/** What a request for answers begins: who was asked, and by whom the answers come in. */
export type RequestedResponse = Omit<BegunResponse, 'form' | 'requestId' | 'replacesId'> & {
  /** An edition that was in use when it was asked for; since retired ones are answered all the same. */
  formId: string
  requestId: string
}

/**
 * Begins the response to a request, without answers, in the caller's transaction. The caller records it, checks that the
 * request stands, and holds the request so that two do not begin at once. Answers the row, held for writing.
 */
export const beginRequestedResponse = async (
  tx: Tx,
  { formId, ...requested }: RequestedResponse,
): Promise<QuestionnaireResponse> => {
  const form = await formOf(tx, { formVersion: formId })
  requireInformant(form, requested.informant)
  await insertResponse(tx, { ...requested, form, replacesId: null })
  return tx.findOneOrFail(QuestionnaireResponse, {
    where: { id: requested.id },
    lock: { mode: 'pessimistic_write' },
  })
}

export interface SavedAnswers {
  answers: FormAnswers
  comment: string | null
  answeredOn: Day
}

/**
 * Stores answers to an open response in the caller's transaction, checked against the edition it was begun with: 422 by
 * item. Throws StaleWrite when the row has another version by now.
 */
export const saveAnswers = async (
  tx: Tx,
  response: Pick<QuestionnaireResponse, 'id' | 'formVersion' | 'lockedAt'>,
  version: number,
  saved: SavedAnswers & Partial<Pick<QuestionnaireDraft, 'informant' | 'respondentName' | 'cutOffSet'>>,
): Promise<void> => {
  if (response.lockedAt !== null) throw closed()
  const form = await formOf(tx, response)
  if (saved.informant !== undefined) requireInformant(form, saved.informant)
  const problems = answerProblems(form.definition, saved.answers)
  if (Object.keys(problems).length > 0) throw invalid(problems)
  await updateIfCurrent(tx, QuestionnaireResponse, response.id, version, saved)
}

/**
 * Locks a response in the caller's transaction and stores its score, computed here from the stored answers and the named
 * cut-offs: no figure of the browser is used. Unanswered activities are allowed and counted; a form without any answer is
 * not. `lockedById` is null when nobody signed in sends it. Throws StaleWrite.
 */
export const lockResponse = async (
  tx: Tx,
  response: QuestionnaireResponse,
  version: number,
  lockedById: string | null,
): Promise<FormScore> => {
  if (response.lockedAt !== null) throw closed()
  if (isBlank(response.answers))
    throw invalid({ answers: 'Nothing is answered yet. “Does not do this yet” is an answer too.' })
  const cutOffs = cutOffSetById(response.cutOffSet)
  if (!cutOffs) throw invalid({ cutOffSet: 'Choose a cut-off set from the list' })
  const score = scoreForm(await formOf(tx, response), response.answers, cutOffs)
  await updateIfCurrent(tx, QuestionnaireResponse, response.id, version, {
    score,
    lockedAt: now(),
    lockedById,
  })
  return score
}

/** Begins a response with no answers, under the clinic's cut-offs. Answers its id. */
export const startQuestionnaire = async (
  actor: Actor,
  access: ChildAccess,
  start: QuestionnaireStart,
  key: string | null,
): Promise<string> => {
  await requirePastDay(access, 'answeredOn', 'The date answered', start.answeredOn)
  const { cutOffSet } = await readSettings()
  return transact(actor, (tx, record) => {
    const request = ['questionnaire', access.childId, start]
    const factOf = (id: string) => fact(access, 'started', id)
    return createOnce(tx, actor, record, { key, request }, factOf, async (newId) => {
      await requireConsent(tx, access, 'assessment_treatment')
      const form = await formToBegin(tx, start.formId, start.informant)
      if (start.replacesId !== null) await checkReplaced(tx, access, start.replacesId, form)
      await insertResponse(tx, {
        id: newId,
        childId: access.childId,
        form,
        informant: start.informant,
        respondentName: start.respondentName,
        answeredOn: start.answeredOn,
        cutOffSet,
        requestId: null,
        guardianId: null,
        startedById: access.viewer.id,
        replacesId: start.replacesId,
      })
    })
  })
}

/** Saves the answers so far and answers them as this save left them. Throws StaleWrite when somebody saved in between. */
export const saveQuestionnaire = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
  draft: QuestionnaireDraft,
): Promise<QuestionnaireRecord> => {
  await requirePastDay(access, 'answeredOn', 'The date answered', draft.answeredOn)
  return transact(actor, async (tx, record) => {
    const { informant, respondentName, answeredOn, answers, cutOffSet, comment } = draft
    const saved = { informant, respondentName, answeredOn, answers, cutOffSet, comment }
    await saveAnswers(tx, await openResponse(tx, access, id), version, saved)
    record(fact(access, 'changed', id))
    return findQuestionnaire(access, id, tx)
  })
}

/** Locks a response with its score; see `lockResponse`. */
export const lockQuestionnaire = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const response = await openResponse(tx, access, id)
    await requireConsent(tx, access, 'assessment_treatment')
    await lockResponse(tx, response, version, access.viewer.id)
    record(fact(access, 'locked', id))
  })

/** Removes a response that was begun and never locked. Throws StaleWrite when somebody answered in it in between. */
export const discardQuestionnaire = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const response = await openResponse(tx, access, id)
    if (response.version !== version) throw new StaleWrite()
    await tx.delete(QuestionnaireResponse, id)
    record(fact(access, 'discarded', id))
  })
