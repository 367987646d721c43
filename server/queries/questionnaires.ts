import type { Day } from '../../shared/days.ts'
import { cutOffSetById, defaultCutOffSet, scoreHandUse, type HandUseScore } from '../../shared/handUse.ts'
import type { HandUseAnswers, Informant } from '../../shared/questionnaires.ts'
import { isId } from '../../shared/fields.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { within } from './scope.ts'
import { flag, fromJson, selectRows } from './sql.ts'

interface StoredResponse {
  id: string
  childId: string
  formVersion: string
  informant: Informant
  respondentName: string | null
  answeredOn: Day
  answers: string
  comment: string | null
  cutOffSet: string
  score: string | null
  lockedAt: Date | null
  lockedBy: string | null
  replacesId: string | null
  replacedById: string | null
  superseded: number
  version: number
}

export interface QuestionnaireRecord extends Omit<StoredResponse, 'answers' | 'score' | 'superseded'> {
  answers: HandUseAnswers
  /** As stored when locked; until then computed from the answers at hand. */
  score: HandUseScore
  /** A locked newer version took its place. */
  superseded: boolean
}

const toRecord = ({ answers, score, superseded, ...rest }: StoredResponse): QuestionnaireRecord => {
  const given = fromJson<HandUseAnswers>(answers)
  return {
    ...rest,
    answers: given,
    score:
      score === null
        ? scoreHandUse(given, cutOffSetById(rest.cutOffSet) ?? defaultCutOffSet)
        : fromJson<HandUseScore>(score),
    superseded: flag(superseded),
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
    `SELECT q.id, q.childId, q.formVersion, q.informant, q.respondentName, q.answeredOn, q.answers, q.comment,
       q.cutOffSet, q.score, q.lockedAt, u.displayName AS lockedBy, q.replacesId, n.id AS replacedById,
       (n.lockedAt IS NOT NULL) AS superseded, q.version
     FROM questionnaire_responses q
     LEFT JOIN users u ON u.id = q.lockedById
     LEFT JOIN questionnaire_responses n ON n.replacesId = q.id
     WHERE ${scope.sql} AND ${condition} ORDER BY q.answeredOn DESC, q.createdAt DESC, q.id`,
    { ...scope.parameters, ...parameters },
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
