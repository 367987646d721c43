import type { QuestionnaireView } from '../../shared/questionnaires.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import {
  canChangeQuestionnaire,
  canDiscardQuestionnaire,
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
  leftOver: response.leftOver,
  version: response.version,
  can: {
    change: canChangeQuestionnaire(access, response),
    lock: canChangeQuestionnaire(access, response),
    discard: canDiscardQuestionnaire(access, response),
    replace: canReplaceQuestionnaire(access, response),
  },
})
