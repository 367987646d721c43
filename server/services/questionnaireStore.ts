import type { Day } from '../../shared/days.ts'
import { answerProblems, blankAnswers, isBlank } from '../../shared/formAnswers.ts'
import { scoreForm } from '../../shared/formScores.ts'
import type { FormAnswers, FormScore } from '../../shared/forms.ts'
import { cutOffSetById, type CutOffSetId } from '../../shared/handUse.ts'
import type { Informant, QuestionnaireDraft } from '../../shared/questionnaires.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { QuestionnaireResponse } from '../entities/QuestionnaireResponse.ts'
import { conflict, invalid } from '../errors.ts'
import { findForm, type FormRecord } from '../queries/forms.ts'
import { updateIfCurrent } from './versions.ts'

/* What is stored of a response to a form, whoever answers: in the transaction of the caller. */

export const responseClosed = () =>
  conflict(
    'closed',
    'This response was signed or sent and stays as it is. To correct it, start a new one that replaces it.',
  )

/** The edition a response was begun with; it stays answerable after it was retired. */
export const formOf = async (tx: Tx, { formVersion }: Pick<QuestionnaireResponse, 'formVersion'>) => {
  const form = await findForm(formVersion, tx)
  if (!form) throw new Error('A response names a form that is not there')
  return form
}

/** Refuses (422) who is not meant to answer this form. */
export const requireInformant = ({ definition }: FormRecord, informant: Informant): void => {
  if (!definition.informants.includes(informant))
    throw invalid({ informant: `“${definition.title}” is not answered by them. Choose somebody else.` })
}

export interface BegunResponse {
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

export const insertResponse = async (tx: Tx, { form, cutOffSet, ...begun }: BegunResponse): Promise<void> => {
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
  if (response.lockedAt !== null) throw responseClosed()
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
  if (response.lockedAt !== null) throw responseClosed()
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
