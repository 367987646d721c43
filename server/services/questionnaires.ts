import { cutOffSetById, handUseFormV1, scoreHandUse } from '../../shared/handUse.ts'
import type { QuestionnaireDraft, QuestionnaireStart } from '../../shared/questionnaires.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { QuestionnaireResponse } from '../entities/QuestionnaireResponse.ts'
import { conflict, invalid } from '../errors.ts'
import { findQuestionnaire, type QuestionnaireRecord } from '../queries/questionnaires.ts'
import { findForChild } from '../queries/scope.ts'
import { selectOne } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { requireConsent, requirePastDay } from './recordRules.ts'
import { readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { updateIfCurrent } from './versions.ts'

const fact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action: `questionnaire.${action}`,
  objectType: 'questionnaire',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

const unanswered = Object.fromEntries(handUseFormV1.items.map((item) => [item.id, null]))

const closed = () =>
  conflict(
    'closed',
    'This response is locked and stays as it is. To correct it, start a new one that replaces it.',
  )

/** The response for writing; locked ones are refused here and, should this ever fail, by a trigger. */
const openResponse = async (tx: Tx, access: ChildAccess, id: string): Promise<QuestionnaireResponse> => {
  const response = await findForChild(access, QuestionnaireResponse, id, tx, { lock: true })
  if (response.lockedAt !== null) throw closed()
  return response
}

const checkReplaced = async (tx: Tx, access: ChildAccess, replacesId: string): Promise<void> => {
  const earlier = await findForChild(access, QuestionnaireResponse, replacesId, tx, { lock: true })
  if (earlier.lockedAt === null)
    throw conflict('not_locked', 'Only a locked response is replaced. This one can still be changed.')
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
      if (start.replacesId !== null) await checkReplaced(tx, access, start.replacesId)
      await tx.insert(QuestionnaireResponse, {
        id: newId,
        childId: access.childId,
        formVersion: handUseFormV1.version,
        informant: start.informant,
        respondentName: start.respondentName,
        answeredOn: start.answeredOn,
        answers: unanswered,
        comment: null,
        cutOffSet,
        score: null,
        lockedAt: null,
        lockedById: null,
        startedById: access.viewer.id,
        replacesId: start.replacesId,
        createdAt: now(),
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
    await openResponse(tx, access, id)
    const { informant, respondentName, answeredOn, answers, cutOffSet, comment } = draft
    const patch = { informant, respondentName, answeredOn, answers, cutOffSet, comment }
    await updateIfCurrent(tx, QuestionnaireResponse, id, version, patch)
    record(fact(access, 'changed', id))
    return findQuestionnaire(access, id, tx)
  })
}

/**
 * Locks a response and stores its score, computed here from the stored answers and the named cut-offs: no figure of the
 * browser is used. Unanswered activities are allowed and counted; a form without any answer is not. Throws StaleWrite.
 */
export const lockQuestionnaire = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const response = await openResponse(tx, access, id)
    await requireConsent(tx, access, 'assessment_treatment')
    if (Object.values(response.answers).every((answer) => answer === null))
      throw invalid({ answers: 'Nothing is answered yet. “Does not do this yet” is an answer too.' })
    const cutOffs = cutOffSetById(response.cutOffSet)
    if (!cutOffs) throw invalid({ cutOffSet: 'Choose a cut-off set from the list' })
    const patch = {
      score: scoreHandUse(response.answers, cutOffs),
      lockedAt: now(),
      lockedById: access.viewer.id,
    }
    await updateIfCurrent(tx, QuestionnaireResponse, id, version, patch)
    record(fact(access, 'locked', id))
  })

/** Removes a response that was begun and never locked. */
export const discardQuestionnaire = (actor: Actor, access: ChildAccess, id: string): Promise<void> =>
  transact(actor, async (tx, record) => {
    await openResponse(tx, access, id)
    await tx.delete(QuestionnaireResponse, id)
    record(fact(access, 'discarded', id))
  })
