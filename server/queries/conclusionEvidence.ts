import type { Unfinished } from '../../shared/conclusions.ts'
import type { EvidenceRow } from '../../shared/conclusionEvidence.ts'
import { formatDay, type Day } from '../../shared/days.ts'
import { measureKindLabels, type MeasureKind } from '../../shared/measures.ts'
import { informantLabels, type Informant } from '../../shared/questionnaires.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { within } from './scope.ts'
import { flag, fromJson, selectRows } from './sql.ts'

type StoredEvidence = Omit<EvidenceRow, 'score' | 'superseded'> & { score: string | null; superseded: number }

const newerLocked = (table: string, row: string) =>
  `EXISTS (SELECT 1 FROM ${table} x WHERE x.replacesId = ${row}.id AND x.lockedAt IS NOT NULL)`

/** Everything locked or signed on the child's record that a conclusion may rest on, the newest first. */
export const listEvidence = async (access: ChildAccess, tx?: Tx): Promise<EvidenceRow[]> => {
  const scoped = (column: string) => within(access, column).sql
  const rows = await selectRows<StoredEvidence>(
    `SELECT 'questionnaire' AS kind, q.id, q.answeredOn AS \`on\`, JSON_VALUE(f.definition, '$.title') AS what,
       q.informant, q.score, ${newerLocked('questionnaire_responses', 'q')} AS superseded
     FROM questionnaire_responses q JOIN questionnaire_forms f ON f.id = q.formVersion
     WHERE ${scoped('q.childId')} AND q.lockedAt IS NOT NULL
     UNION ALL SELECT 'measure', m.id, m.measuredOn, m.kind, NULL, IF(m.notDoneReason IS NULL, m.score, NULL),
       ${newerLocked('measures', 'm')}
     FROM measures m WHERE ${scoped('m.childId')} AND m.lockedAt IS NOT NULL
     UNION ALL SELECT 'history', h.id, h.answeredOn, NULL, h.informant, NULL, ${newerLocked('histories', 'h')}
     FROM histories h WHERE ${scoped('h.childId')} AND h.lockedAt IS NOT NULL
     UNION ALL SELECT 'writing_observation', o.id, o.observedOn, JSON_VALUE(o.details, '$.writingHand'), NULL, NULL, 0
     FROM writing_observations o WHERE ${scoped('o.childId')}
     UNION ALL SELECT 'sample', s.id, s.takenOn, JSON_VALUE(s.details, '$.task'), NULL, NULL, 0
     FROM samples s WHERE ${scoped('s.childId')} AND s.removedAt IS NULL
     UNION ALL SELECT 'session_note', n.id, n.heldOn, n.type, NULL, NULL, 0
     FROM session_notes n WHERE ${scoped('n.childId')} AND n.state <> 'draft' AND n.discardedAt IS NULL
     ORDER BY \`on\` DESC, kind, id`,
    within(access, 'q.childId').parameters,
    tx,
  )
  return rows.map(({ score, superseded, ...row }) => ({
    ...row,
    score: score === null ? null : fromJson<EvidenceRow['score']>(score),
    superseded: flag(superseded),
  }))
}

interface BegunRow {
  kind: Unfinished['kind']
  id: string
  on: Day
  what: string
  informant: Informant | null
  /** 1 while the answers are with a family or a teacher. */
  asked: number
}

const begunWords = ({ kind, on, what, informant, asked }: BegunRow) => {
  const name = kind === 'measure' ? (measureKindLabels[what as MeasureKind] ?? 'Measure') : what
  const who = informant ? ` (${informantLabels[informant].toLowerCase()})` : ''
  const next = flag(asked) ? ': still with them, so wait or withdraw the questions' : ''
  return `${name}${who}, begun for ${formatDay(on)}${next}`
}

/**
 * Questionnaires and measures that were begun and not locked. Answers to a request that ended without being sent can no
 * longer be finished by anybody, so they are left out.
 */
export const listUnfinished = async (access: ChildAccess, tx?: Tx): Promise<Unfinished[]> => {
  const scoped = (column: string) => within(access, column).sql
  const rows = await selectRows<BegunRow>(
    `SELECT 'questionnaire' AS kind, q.id, q.answeredOn AS \`on\`, JSON_VALUE(f.definition, '$.title') AS what,
       q.informant, (r.id IS NOT NULL) AS asked
     FROM questionnaire_responses q JOIN questionnaire_forms f ON f.id = q.formVersion
       LEFT JOIN answer_requests r ON r.id = q.requestId
     WHERE ${scoped('q.childId')} AND q.lockedAt IS NULL
       AND (r.id IS NULL OR (r.cancelledAt IS NULL AND r.expiresAt > :evidenceNow))
     UNION ALL SELECT 'measure', m.id, m.measuredOn, m.kind, NULL, 0
     FROM measures m WHERE ${scoped('m.childId')} AND m.lockedAt IS NULL
     ORDER BY \`on\`, id`,
    { ...within(access, 'q.childId').parameters, evidenceNow: now() },
    tx,
  )
  return rows.map((row) => ({ kind: row.kind, id: row.id, words: begunWords(row) }))
}
