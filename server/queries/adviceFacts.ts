import { adviceFactsFromRecord } from '../../shared/adviceFactsFromRecord.ts'
import type { AdviceFacts } from '../../shared/adviceFacts.ts'
import type { WritingHand } from '../../shared/children.ts'
import type { Day } from '../../shared/days.ts'
import type { GoalDetails } from '../../shared/goals.ts'
import type { HandUseAnswers } from '../../shared/questionnaires.ts'
import type { ReferralConcern, ScriptDirection } from '../../shared/referrals.ts'
import type { SampleDetails } from '../../shared/samples.ts'
import type { WritingObservationDetails } from '../../shared/writingObservations.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { notFound } from '../errors.ts'
import { within } from './scope.ts'
import { fromJson, selectOne, selectRows } from './sql.ts'

interface RecordRow {
  birthDate: Day
  writingHand: WritingHand | null
  scriptDirection: ScriptDirection
  observation: string | null
  handUse: string | null
  sample: string | null
}

/**
 * The newest observation, locked questionnaire that asks about writing and cutting, and sample of the child, with what
 * identity says about writing.
 */
const findNewest = (access: ChildAccess): Promise<RecordRow | null> => {
  const scope = within(access, 'c.id')
  return selectOne<RecordRow>(
    `SELECT c.birthDate, c.writingHand, c.scriptDirection,
       (SELECT o.details FROM writing_observations o WHERE o.childId = c.id
         ORDER BY o.observedOn DESC, o.recordedAt DESC, o.id LIMIT 1) AS observation,
       (SELECT q.answers FROM questionnaire_responses q WHERE q.childId = c.id AND q.lockedAt IS NOT NULL
         AND JSON_CONTAINS_PATH(q.answers, 'one', '$.scissors')
         AND NOT EXISTS (SELECT 1 FROM questionnaire_responses n WHERE n.replacesId = q.id AND n.lockedAt IS NOT NULL)
         ORDER BY q.answeredOn DESC, q.lockedAt DESC, q.id LIMIT 1) AS handUse,
       (SELECT s.details FROM samples s WHERE s.childId = c.id AND s.removedAt IS NULL
         ORDER BY s.takenOn DESC, s.uploadedAt DESC, s.id LIMIT 1) AS sample
     FROM children c WHERE ${scope.sql}`,
    scope.parameters,
  )
}

/** Concerns of every referral that led to this record, each once. */
const listConcerns = async (access: ChildAccess): Promise<ReferralConcern[]> => {
  const scope = within(access, 'r.childId')
  const rows = await selectRows<{ concerns: string }>(
    `SELECT JSON_EXTRACT(r.details, '$.concerns') AS concerns FROM referrals r
     WHERE r.status IN ('accepted', 'merged') AND ${scope.sql} ORDER BY r.receivedOn, r.id`,
    scope.parameters,
  )
  return [...new Set(rows.flatMap((row) => fromJson<ReferralConcern[]>(row.concerns)))]
}

const listOpenGoals = async (access: ChildAccess): Promise<string[]> => {
  const scope = within(access, 'g.childId')
  const rows = await selectRows<{ details: string }>(
    `SELECT g.details FROM goals g WHERE g.endedOn IS NULL AND ${scope.sql} ORDER BY g.setOn, g.id`,
    scope.parameters,
  )
  return rows.map((row) => fromJson<GoalDetails>(row.details).activity)
}

const parsed = <T>(text: string | null): T | null => (text === null ? null : fromJson<T>(text))

/** What the record knows when advice is chosen. Reads; decides nothing. */
export const readAdviceFacts = async (access: ChildAccess, today: Day): Promise<AdviceFacts> => {
  const [row, concerns, goals] = await Promise.all([
    findNewest(access),
    listConcerns(access),
    listOpenGoals(access),
  ])
  if (!row) throw notFound()
  return adviceFactsFromRecord({
    today,
    birthDate: row.birthDate,
    writingHand: row.writingHand,
    scriptDirection: row.scriptDirection,
    concerns,
    observation: parsed<WritingObservationDetails>(row.observation),
    handUse: parsed<HandUseAnswers>(row.handUse),
    sample: parsed<SampleDetails>(row.sample),
    goals,
  })
}
