import type { Informant, QuestionnaireDraft, QuestionnaireStart } from '../../shared/questionnaires.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { QuestionnaireResponse } from '../entities/QuestionnaireResponse.ts'
import { conflict, invalid } from '../errors.ts'
import { hasRequestEnded } from '../queries/answerRequests.ts'
import { findForm, type FormRecord } from '../queries/forms.ts'
import { findQuestionnaire, type QuestionnaireRecord } from '../queries/questionnaires.ts'
import { findForChild } from '../queries/scope.ts'
import { selectOne } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import {
  formOf,
  insertResponse,
  lockResponse,
  requireInformant,
  responseClosed,
  saveAnswers,
} from './questionnaireStore.ts'
import { requestEnded, requireConsent, requirePastDay } from './recordRules.ts'
import { readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { StaleWrite } from './versions.ts'

const fact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action: `questionnaire.${action}`,
  objectType: 'questionnaire',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

/** Locked ones are refused here and, should this ever fail, by a trigger. */
const unlockedResponse = async (tx: Tx, access: ChildAccess, id: string): Promise<QuestionnaireResponse> => {
  const response = await findForChild(access, QuestionnaireResponse, id, tx, { lock: true })
  if (response.lockedAt !== null) throw responseClosed()
  return response
}

const asked = () =>
  conflict('asked', 'These are the answers of the person who was asked. They alone can change and send them.')

/** The response for writing by staff: the words of somebody who was asked are never changed by them. */
const openResponse = async (tx: Tx, access: ChildAccess, id: string): Promise<QuestionnaireResponse> => {
  const response = await unlockedResponse(tx, access, id)
  if (response.requestId === null) return response
  if (await hasRequestEnded(response.requestId, tx)) throw requestEnded()
  throw asked()
}

/** The response to throw away: begun by staff, or left over from a request that ended. */
const discardableResponse = async (
  tx: Tx,
  access: ChildAccess,
  id: string,
): Promise<QuestionnaireResponse> => {
  const response = await unlockedResponse(tx, access, id)
  if (response.requestId !== null && !(await hasRequestEnded(response.requestId, tx))) throw asked()
  return response
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
    throw conflict(
      'not_locked',
      'Only a response that was signed or sent is replaced. This one can still be changed.',
    )
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

/**
 * Removes a response that was begun and never locked, also one of a request that ended before it was sent. Throws
 * StaleWrite when somebody answered in it in between.
 */
export const discardQuestionnaire = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const response = await discardableResponse(tx, access, id)
    if (response.version !== version) throw new StaleWrite()
    await tx.delete(QuestionnaireResponse, id)
    record(fact(access, 'discarded', id))
  })
