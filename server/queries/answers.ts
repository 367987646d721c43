import { blankAnswers } from '../../shared/formAnswers.ts'
import type { FormAnswers } from '../../shared/forms.ts'
import type { HistoryDetails } from '../../shared/histories.ts'
import type { AnswerableRequest } from './answerRequests.ts'
import { findForm, type FormRecord } from './forms.ts'
import { fromJson, selectOne } from './sql.ts'

/** What was answered so far to a request, whichever form was asked. */
export interface KeptAnswers {
  form: FormRecord | null
  answers: FormAnswers | null
  comment: string | null
  history: HistoryDetails | null
  /** 0 while nothing was saved. */
  version: number
}

const findKeptHistory = async ({ id, childId }: AnswerableRequest): Promise<KeptAnswers> => {
  const kept = await selectOne<{ details: string; version: number }>(
    'SELECT h.details, h.version FROM histories h WHERE h.requestId = :id AND h.childId = :childId',
    { id, childId },
  )
  return {
    form: null,
    answers: null,
    comment: null,
    history: kept && fromJson<HistoryDetails>(kept.details),
    version: kept?.version ?? 0,
  }
}

const findKeptResponse = async ({ id, childId, formId }: AnswerableRequest): Promise<KeptAnswers> => {
  const form = formId === null ? null : await findForm(formId)
  if (!form) throw new Error('A request asks for a form that is not there')
  const kept = await selectOne<{ answers: string; comment: string | null; version: number }>(
    `SELECT q.answers, q.comment, q.version FROM questionnaire_responses q
     WHERE q.requestId = :id AND q.childId = :childId`,
    { id, childId },
  )
  return {
    form,
    answers: kept ? fromJson<FormAnswers>(kept.answers) : blankAnswers(form.definition),
    comment: kept?.comment ?? null,
    history: null,
    version: kept?.version ?? 0,
  }
}

/** The answers to a request that was found as the viewer's own, or through its link. */
export const findKeptAnswers = (request: AnswerableRequest): Promise<KeptAnswers> =>
  request.asks === 'history' ? findKeptHistory(request) : findKeptResponse(request)
