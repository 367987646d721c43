import { consentNeededTexts } from '../../shared/consentNeeded.ts'
import { handUseRows } from '../../shared/handProfile.ts'
import type { LateralLineRow } from '../../shared/lateralLine.ts'
import type { HandProfileView, QuestionnaireView } from '../../shared/questionnaires.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import {
  canAddQuestionnaire,
  canChangeQuestionnaire,
  canReplaceQuestionnaire,
} from '../policies/questionnaires.ts'
import type { QuestionnaireRecord } from '../queries/questionnaires.ts'
import { presentForm } from './forms.ts'

export const presentQuestionnaire = (
  response: QuestionnaireRecord,
  access: ChildAccess,
): QuestionnaireView => ({
  id: response.id,
  childId: response.childId,
  form: presentForm(response.form),
  informant: response.informant,
  respondentName: response.respondentName,
  answeredOn: response.answeredOn,
  answers: response.answers,
  comment: response.comment,
  cutOffSet: response.cutOffSet,
  score: response.score,
  lockedAt: response.lockedAt?.toISOString() ?? null,
  lockedBy: response.lockedBy,
  requestId: response.requestId,
  replacesId: response.replacesId,
  replacedById: response.replacedById,
  version: response.version,
  can: {
    change: canChangeQuestionnaire(access, response),
    lock: canChangeQuestionnaire(access, response),
    replace: canReplaceQuestionnaire(access, response),
  },
})

/** Locked responses that no locked newer one replaced, as rows of the lateral line. */
export const presentHandUseRows = (responses: readonly QuestionnaireRecord[]): LateralLineRow[] =>
  handUseRows(
    responses.flatMap(({ id, answeredOn, informant, score, lockedAt, superseded }) =>
      lockedAt !== null && !superseded
        ? [{ id, answeredOn, informant, score, lockedAt: lockedAt.toISOString() }]
        : [],
    ),
  )

export const presentHandProfile = (
  responses: readonly QuestionnaireRecord[],
  access: ChildAccess,
  consented: boolean,
): HandProfileView => ({
  lateralLine: presentHandUseRows(responses),
  questionnaires: responses.map((response) => presentQuestionnaire(response, access)),
  blocked: consented ? null : consentNeededTexts.assessment_treatment,
  can: { add: canAddQuestionnaire(access, consented) },
})
