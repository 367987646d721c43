import type { Day } from '../../shared/days.ts'
import type { FormAnswers, FormDefinition, FormScore } from '../../shared/forms.ts'
import type { HandUseScore } from '../../shared/handUse.ts'
import type { LockedMeasure } from '../../shared/measureRows.ts'
import type { MeasureDetails, MeasureScore } from '../../shared/measures.ts'
import type { LockedResponse } from '../../shared/questionnaireRows.ts'
import type { Informant } from '../../shared/questionnaires.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import type { MeasureRecord } from './measures.ts'
import type { QuestionnaireRecord } from './questionnaires.ts'
import { within } from './scope.ts'
import { fromJson, selectRows } from './sql.ts'

/** What the lateral line is drawn from: questionnaires and measures that are locked and not replaced. */
export interface HandEvidence {
  responses: LockedResponse[]
  measures: LockedMeasure[]
}

interface StoredEvidence {
  id: string
  on: Day
  lockedAt: Date
  score: string
  /** Answers of a questionnaire, details of a measure. */
  content: string
  informant: Informant | null
  formId: string | null
  formKey: string | null
  edition: number | null
  definition: string | null
  retiredAt: Date | null
  notDoneReason: string | null
}

const newest = (table: string, row: string) => `${row}.lockedAt IS NOT NULL
  AND NOT EXISTS (SELECT 1 FROM ${table} x WHERE x.replacesId = ${row}.id AND x.lockedAt IS NOT NULL)`

const toResponse = (row: StoredEvidence): LockedResponse[] => {
  const { formId, formKey, edition, informant } = row
  if (formId === null || formKey === null || edition === null || informant === null) return []
  const definition = fromJson<FormDefinition>(row.definition ?? '')
  return [
    {
      id: row.id,
      form: {
        id: formId,
        key: formKey,
        edition,
        definition,
        retiredAt: row.retiredAt?.toISOString() ?? null,
      },
      informant,
      answeredOn: row.on,
      answers: fromJson<FormAnswers>(row.content),
      // Scores stored while there was one form only name neither method nor total.
      score: {
        method: definition.scoring,
        total: null,
        ...fromJson<HandUseScore | FormScore>(row.score),
      },
      lockedAt: row.lockedAt.toISOString(),
    },
  ]
}

const toMeasure = (row: StoredEvidence): LockedMeasure => ({
  id: row.id,
  measuredOn: row.on,
  lockedAt: row.lockedAt.toISOString(),
  details: fromJson<MeasureDetails>(row.content),
  score: fromJson<MeasureScore>(row.score),
  notDoneReason: row.notDoneReason,
})

/** The hand evidence of a child in one query. */
export const listLockedHandEvidence = async (access: ChildAccess, tx?: Tx): Promise<HandEvidence> => {
  const scoped = (column: string) => within(access, column).sql
  const rows = await selectRows<StoredEvidence>(
    `SELECT q.id, q.answeredOn AS \`on\`, q.lockedAt, q.score, q.answers AS content, q.informant, f.id AS formId,
       f.formKey, f.edition, f.definition, f.retiredAt, NULL AS notDoneReason
     FROM questionnaire_responses q JOIN questionnaire_forms f ON f.id = q.formVersion
     WHERE ${scoped('q.childId')} AND ${newest('questionnaire_responses', 'q')}
     UNION ALL SELECT m.id, m.measuredOn, m.lockedAt, m.score, m.details, NULL, NULL, NULL, NULL, NULL, NULL,
       m.notDoneReason
     FROM measures m WHERE ${scoped('m.childId')} AND ${newest('measures', 'm')}
     ORDER BY \`on\` DESC, lockedAt DESC, id`,
    within(access, 'q.childId').parameters,
    tx,
  )
  const [asked, measured] = [
    rows.filter(({ formId }) => formId !== null),
    rows.filter(({ formId }) => formId === null),
  ]
  return { responses: asked.flatMap(toResponse), measures: measured.map(toMeasure) }
}

/** The same out of whole lists, drafts and replaced ones among them, that were read already. */
export const lockedHandEvidence = (
  questionnaires: readonly QuestionnaireRecord[],
  measures: readonly MeasureRecord[],
): HandEvidence => ({
  responses: questionnaires.flatMap(({ lockedAt, superseded, form, ...response }) =>
    lockedAt === null || superseded
      ? []
      : [
          {
            ...response,
            form: { ...form, retiredAt: form.retiredAt?.toISOString() ?? null },
            lockedAt: lockedAt.toISOString(),
          },
        ],
  ),
  measures: measures.flatMap(({ lockedAt, superseded, ...measure }) =>
    lockedAt === null || superseded ? [] : [{ ...measure, lockedAt: lockedAt.toISOString() }],
  ),
})
