import type { Day } from '../../shared/days.ts'
import { isId } from '../../shared/fields.ts'
import { scoreForm } from '../../shared/formScores.ts'
import type { FormAnswers, FormDefinition, FormScore } from '../../shared/forms.ts'
import { cutOffSetById, defaultCutOffSet, type HandUseScore } from '../../shared/handUse.ts'
import type { Informant } from '../../shared/questionnaires.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { leftOver } from './answerRequests.ts'
import type { FormRecord } from './forms.ts'
import { within } from './scope.ts'
import { flag, fromJson, selectRows } from './sql.ts'

interface StoredResponse {
  id: string
  childId: string
  formId: string
  formKey: string
  edition: number
  definition: string
  retiredAt: Date | null
  informant: Informant
  respondentName: string | null
  answeredOn: Day
  answers: string
  comment: string | null
  cutOffSet: string
  score: string | null
  lockedAt: Date | null
  lockedBy: string | null
  requestId: string | null
  replacesId: string | null
  replacedById: string | null
  superseded: number
  leftOver: number
  version: number
}

type Read =
  | 'answers'
  | 'score'
  | 'superseded'
  | 'leftOver'
  | 'formId'
  | 'formKey'
  | 'edition'
  | 'definition'
  | 'retiredAt'

export interface QuestionnaireRecord extends Omit<StoredResponse, Read> {
  /** The edition that is answered, which stays though a newer one was made. */
  form: FormRecord
  answers: FormAnswers
  /** As stored when locked; until then computed from the answers at hand. */
  score: FormScore
  /** A locked newer version took its place. */
  superseded: boolean
  /** Begun for a request that ended before the answers were sent. */
  leftOver: boolean
}

const toRecord = (stored: StoredResponse): QuestionnaireRecord => {
  const {
    formId,
    formKey,
    edition,
    definition,
    retiredAt,
    answers,
    score,
    superseded,
    leftOver: over,
    ...rest
  } = stored
  const form = {
    id: formId,
    key: formKey,
    edition,
    definition: fromJson<FormDefinition>(definition),
    retiredAt,
  }
  const given = fromJson<FormAnswers>(answers)
  return {
    ...rest,
    form,
    answers: given,
    score:
      score === null
        ? scoreForm(form, given, cutOffSetById(rest.cutOffSet) ?? defaultCutOffSet)
        : // Scores stored while there was one form only name neither method nor total.
          { method: form.definition.scoring, total: null, ...fromJson<HandUseScore | FormScore>(score) },
    superseded: flag(superseded),
    leftOver: flag(over),
  }
}

const selectResponses = async (
  access: ChildAccess,
  condition: string,
  parameters: Record<string, string> = {},
  tx?: Tx,
) => {
  const scope = within(access, 'q.childId')
  const rows = await selectRows<StoredResponse>(
    `SELECT q.id, q.childId, f.id AS formId, f.formKey, f.edition, f.definition, f.retiredAt, q.informant,
       q.respondentName, q.answeredOn, q.answers, q.comment, q.cutOffSet, q.score, q.lockedAt,
       u.displayName AS lockedBy, q.requestId, q.replacesId, n.id AS replacedById,
       (n.lockedAt IS NOT NULL) AS superseded, ${leftOver('r')} AS leftOver, q.version
     FROM questionnaire_responses q
     JOIN questionnaire_forms f ON f.id = q.formVersion
     LEFT JOIN users u ON u.id = q.lockedById
     LEFT JOIN questionnaire_responses n ON n.replacesId = q.id
     LEFT JOIN answer_requests r ON r.id = q.requestId
     WHERE ${scope.sql} AND ${condition} ORDER BY q.answeredOn DESC, q.createdAt DESC, q.id`,
    { ...scope.parameters, ...parameters, requestNow: now() },
    tx,
  )
  return rows.map(toRecord)
}

/** Every response of a child, newest first. */
export const listQuestionnaires = (access: ChildAccess): Promise<QuestionnaireRecord[]> =>
  selectResponses(access, '1 = 1')

export const findQuestionnaire = async (
  access: ChildAccess,
  id: string,
  tx?: Tx,
): Promise<QuestionnaireRecord> => {
  if (!isId(id)) throw notFound()
  const [found] = await selectResponses(access, 'q.id = :responseId', { responseId: id }, tx)
  if (!found) throw notFound()
  return found
}
