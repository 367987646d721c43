import type { AnswererKind, LinkEndReason, RequestedForm } from '../../shared/answerRequests.ts'
import type { Day } from '../../shared/days.ts'
import { isId } from '../../shared/fields.ts'
import type { Viewer } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { consentHolds } from './inForce.ts'
import { calledName, spokenName } from './names.ts'
import { selectPage, type PageOf, type PageSlice } from './pages.ts'
import { ageOfMajority, childScope, ownLink, within } from './scope.ts'
import { count, flag, selectOne, selectRows, type SqlParameters } from './sql.ts'

// The purposes are words of ours; parameters of their own would clash with those of a teacher's scope.
export const agreed = (purpose: 'assessment_treatment' | 'share_school_observation') =>
  `EXISTS (SELECT 1 FROM consents ac WHERE ac.childId = r.childId AND ac.purpose = '${purpose}'
    AND ${consentHolds('ac', ':scopeNow')})`

/** Not answered, not withdrawn, in time. Parameter :scopeNow. */
export const stillOpen = (row: string) =>
  `${row}.answeredAt IS NULL AND ${row}.cancelledAt IS NULL AND ${row}.expiresAt > :scopeNow`

/**
 * Answers begun for a request that was withdrawn or ran out before they were sent: nobody can finish them any more.
 * `row` is the request, joined from the left. Parameter :requestNow.
 */
export const leftOver = (row: string) =>
  `(${row}.id IS NOT NULL AND ${row}.answeredAt IS NULL
    AND (${row}.cancelledAt IS NOT NULL OR ${row}.expiresAt <= :requestNow))`

/** Has this request ended without being answered? It never opens again. */
export const hasRequestEnded = async (id: string, tx: Tx): Promise<boolean> => {
  const found = await selectOne<{ ended: number }>(
    `SELECT ${leftOver('r')} AS ended FROM answer_requests r WHERE r.id = :id`,
    { id, requestNow: now() },
    tx,
  )
  return found !== null && flag(found.ended)
}

const answerId = 'COALESCE(q.id, h.id)'
const withAnswers = `LEFT JOIN questionnaire_responses q ON q.requestId = r.id
  LEFT JOIN histories h ON h.requestId = r.id`
export const withPeople = `JOIN children c ON c.id = r.childId LEFT JOIN guardians g ON g.id = r.guardianId
  LEFT JOIN users t ON t.id = r.teacherId LEFT JOIN questionnaire_forms f ON f.id = r.formId`
const formTitle = "JSON_VALUE(f.definition, '$.title')"
const askedOf = 'COALESCE(g.name, t.displayName)'

export interface AnswerRequestRow {
  id: string
  asks: RequestedForm
  formTitle: string | null
  answerer: AnswererKind
  askedOf: string
  askedAt: Date
  expiresAt: Date
  byLink: boolean
  reminders: number
  answeredAt: Date | null
  cancelledAt: Date | null
  cancelledWhy: LinkEndReason | null
  answerId: string | null
  version: number
}

type StoredRow = Omit<AnswerRequestRow, 'byLink'> & { byLink: number }
const toRow = (row: StoredRow): AnswerRequestRow => ({ ...row, byLink: flag(row.byLink) })
const rowColumns = `r.id, r.asks, ${formTitle} AS formTitle, r.answerer, ${askedOf} AS askedOf, r.askedAt, r.expiresAt,
  r.tokenHash IS NOT NULL AS byLink, r.reminders, r.answeredAt, r.cancelledAt, r.cancelledWhy,
  ${answerId} AS answerId, r.version`
const rowTables = `FROM answer_requests r ${withPeople} ${withAnswers}`

/** What was asked about this child, newest first. `waiting` counts those of the whole record that can be answered. */
export const listAnswerRequests = async (
  access: ChildAccess,
  slice: PageSlice,
): Promise<PageOf<AnswerRequestRow> & { waiting: number }> => {
  const scope = within(access, 'r.childId')
  const [page, counted] = await Promise.all([
    selectPage<StoredRow>(
      {
        select: rowColumns,
        from: `${rowTables} WHERE ${scope.sql}`,
        orderBy: 'r.askedAt DESC, r.id',
        parameters: scope.parameters,
      },
      slice,
    ),
    selectOne<{ waiting: string }>(
      `SELECT COUNT(*) AS waiting FROM answer_requests r WHERE ${scope.sql} AND ${stillOpen('r')}`,
      { ...scope.parameters, scopeNow: now() },
    ),
  ])
  return { rows: page.rows.map(toRow), total: page.total, waiting: counted ? count(counted.waiting) : 0 }
}

/** One request of this child; 404 for every other. */
export const findAnswerRequest = async (access: ChildAccess, id: string): Promise<AnswerRequestRow> => {
  if (!isId(id)) throw notFound()
  const scope = within(access, 'r.childId')
  const row = await selectOne<StoredRow>(
    `SELECT ${rowColumns} ${rowTables} WHERE ${scope.sql} AND r.id = :requestId`,
    { ...scope.parameters, requestId: id },
  )
  if (!row) throw notFound()
  return toRow(row)
}

/** A request as the one who answers meets it. */
export interface AnswerableRequest {
  id: string
  childId: string
  asks: RequestedForm
  formId: string | null
  answerer: AnswererKind
  guardianId: string | null
  /** The account of the one who was asked; null for a carer without one. */
  userId: string | null
  askedOf: string
  childName: string
  spokenName: string
  birthDate: Day
  expiresAt: Date
  /** Can be answered: open, and the family still agrees to assessment. */
  open: boolean
}

const answerable = `r.id, r.childId, r.asks, r.formId, r.answerer, r.guardianId, COALESCE(g.userId, t.id) AS userId,
  ${askedOf} AS askedOf, ${calledName('c')} AS childName, ${spokenName('c')} AS spokenName, c.birthDate, r.expiresAt,
  (${stillOpen('r')} AND ${agreed('assessment_treatment')}) AS open`

type StoredAnswerable = Omit<AnswerableRequest, 'open'> & { open: number }
const toAnswerable = (row: StoredAnswerable | null): AnswerableRequest | null =>
  row && { ...row, open: flag(row.open) }

// The one who was asked, and nobody beside them: neither another carer of the child nor a colleague at school.
const ownRequest = (relation: 'guardian' | 'teacher') =>
  relation === 'guardian'
    ? `r.answerer = 'guardian' AND ${ownLink('g')}`
    : `r.answerer = 'teacher' AND r.teacherId = :scopeViewer AND ${agreed('share_school_observation')}`

/** The viewer's own request about this child; 404 for every other one. It may be over. */
export const findOwnRequest = async (
  access: ChildAccess,
  id: string,
  tx?: Tx,
): Promise<AnswerableRequest> => {
  if (!isId(id) || (access.relation !== 'guardian' && access.relation !== 'teacher')) throw notFound()
  const scope = within(access, 'r.childId')
  const row = await selectOne<StoredAnswerable>(
    `SELECT ${answerable} FROM answer_requests r ${withPeople}
     WHERE r.id = :id AND ${scope.sql} AND ${ownRequest(access.relation)}`,
    { ...scope.parameters, id },
    tx,
  )
  const found = toAnswerable(row)
  if (!found) throw notFound()
  return found
}

/** The child is of age and this carer is not the young person. Alias `g` and `c`, parameter :scopeNow, as below. */
export const comesOfAge = `(g.relation <> 'self' AND c.birthDate <= DATE_SUB(DATE(:scopeNow), INTERVAL ${ageOfMajority} YEAR))`
/** A restriction on one link closes every other link of the same person to the child. */
export const restricted = `(g.restricted = 1 OR EXISTS (SELECT 1 FROM guardians gr WHERE gr.childId = g.childId
  AND gr.userId = g.userId AND gr.restricted = 1))`
export const ended = '(g.endedAt IS NOT NULL AND g.endedAt <= :scopeNow)'

/** The request of a link, while its carer may still be written to and may still stand for the child; else null. */
export const findRequestOfLink = async (tokenHash: Buffer, tx?: Tx): Promise<AnswerableRequest | null> =>
  toAnswerable(
    await selectOne<StoredAnswerable>(
      `SELECT ${answerable} FROM answer_requests r ${withPeople}
       WHERE r.tokenHash = :tokenHash AND r.answerer = 'guardian' AND NOT ${restricted} AND NOT ${ended}
         AND g.safeToContact = 1 AND NOT ${comesOfAge}`,
      { tokenHash, scopeNow: now() },
      tx,
    ),
  )

/** Holds the request's row, so that whatever is done to its answers comes one after the other. */
export const lockRequest = async (tx: Tx, by: { id: string } | { tokenHash: Buffer }): Promise<void> => {
  // Nothing but the row itself is looked at: a wider look would freeze what is seen before the lock is held.
  const [condition, parameters]: [string, SqlParameters] =
    'id' in by ? ['id = :id', { id: by.id }] : ['tokenHash = :tokenHash', { tokenHash: by.tokenHash }]
  await selectOne(`SELECT id FROM answer_requests WHERE ${condition} FOR UPDATE`, parameters, tx)
}

export interface ToAnswerRow {
  id: string
  childId: string
  classId: string | null
  childName: string
  asks: RequestedForm
  formTitle: string | null
  begun: boolean
  askedAt: Date
  expiresAt: Date
}

/** What waits for the viewer, as a carer or as a teacher; the oldest first. */
export const listToAnswer = async (
  viewer: Viewer,
  relation: 'guardian' | 'teacher',
): Promise<ToAnswerRow[]> => {
  const scope = childScope(viewer, relation, 'r.childId')
  const rows = await selectRows<Omit<ToAnswerRow, 'begun'> & { begun: number }>(
    `SELECT r.id, r.childId, IF(r.answerer = 'teacher', c.schoolClassId, NULL) AS classId,
       ${calledName('c')} AS childName, r.asks, ${formTitle} AS formTitle,
       ${answerId} IS NOT NULL AS begun, r.askedAt, r.expiresAt
     FROM answer_requests r ${withPeople} ${withAnswers}
     WHERE ${ownRequest(relation)} AND ${stillOpen('r')} AND ${agreed('assessment_treatment')} AND ${scope.sql}
     ORDER BY r.askedAt, r.id`,
    scope.parameters,
  )
  return rows.map((row) => ({ ...row, begun: flag(row.begun) }))
}
