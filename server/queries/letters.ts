import type {
  DeliveryState,
  LetterApproval,
  LetterDraft,
  LetterFact,
  LetterKind,
  LetterState,
} from '../../shared/letters.ts'
import type { GuardianRelation } from '../../shared/guardians.ts'
import { isId } from '../../shared/fields.ts'
import type { Viewer } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import { notFound } from '../errors.ts'
import type { Tx } from '../dataSource.ts'
import { matchesWords } from './children/lists.ts'
import { emailConsent, runsAt } from './inForce.ts'
import { calledName, wholeNames } from './names.ts'
import { selectPage, type PageOf, type PageSlice } from './pages.ts'
import { within } from './scope.ts'
import { flag, fromJson, selectOne, selectRows, type SqlParameters } from './sql.ts'
import { staffScope } from './staffScope.ts'

export interface LetterRecord {
  id: string
  childId: string
  givenName: string
  familyName: string
  preferredName: string | null
  recordNumber: string
  birthDate: string
  kind: LetterKind
  state: LetterState
  content: LetterDraft
  facts: LetterFact[]
  authorId: string
  author: string
  authorNewlyQualified: boolean
  approver: string | null
  approvedAt: Date | null
  overrides: LetterApproval | null
  approvedVersionId: string | null
  returnedReason: string | null
  pdfBytes: number | null
  pdfSha256: Buffer | null
  version: number
}

type RawLetter = Omit<LetterRecord, 'content' | 'facts' | 'overrides' | 'authorNewlyQualified'> & {
  content: string
  facts: string
  overrides: string | null
  authorNewlyQualified: number
}

/** One letter of this child, under the viewer's scope. */
export const findLetter = async (access: ChildAccess, id: string, tx?: Tx): Promise<LetterRecord> => {
  if (!isId(id)) throw notFound()
  const scope = within(access, 'l.childId')
  const row = await selectOne<RawLetter>(
    `SELECT l.id, l.childId, c.givenName, c.familyName, c.preferredName, c.recordNumber, c.birthDate, l.kind, l.state,
       l.content, l.facts, l.authorId, a.displayName AS author, a.newlyQualified AS authorNewlyQualified,
       p.displayName AS approver, v.approvedAt, v.overrides, l.approvedVersionId, l.returnedReason, v.pdfBytes,
       v.pdfSha256, l.version
     FROM letters l JOIN children c ON c.id = l.childId JOIN users a ON a.id = l.authorId
       LEFT JOIN letter_versions v ON v.id = l.approvedVersionId LEFT JOIN users p ON p.id = v.approvedById
     WHERE l.id = :id AND l.discardedAt IS NULL AND ${scope.sql}`,
    { id, ...scope.parameters },
    tx,
  )
  if (!row) throw notFound()
  return {
    ...row,
    content: fromJson<LetterDraft>(row.content),
    facts: fromJson<LetterFact[]>(row.facts),
    overrides: row.overrides === null ? null : fromJson<LetterApproval>(row.overrides),
    authorNewlyQualified: flag(row.authorNewlyQualified),
  }
}

export interface LetterListRow {
  id: string
  childId: string
  childName: string
  recordNumber: string
  kind: LetterKind
  state: LetterState
  author: string
  approver: string | null
  changedAt: Date
  sentAt: Date | null
  delivery: DeliveryState | null
}

export interface LetterListRequest extends PageSlice {
  state: LetterState | null
  search: string | null
}

const worstDelivery = `(SELECT d.state FROM letter_deliveries d WHERE d.letterId = l.id
  ORDER BY FIELD(d.state, 'failed', 'cancelled', 'queued', 'sending', 'sent', 'opened') LIMIT 1)`

const listColumns = `l.id, l.childId, ${calledName('c')} AS childName,
  c.recordNumber, l.kind, l.state, a.displayName AS author, p.displayName AS approver, l.changedAt,
  (SELECT MIN(m.sentAt) FROM letter_deliveries d JOIN outbox_messages m ON m.id = d.outboxMessageId
    WHERE d.letterId = l.id) AS sentAt, ${worstDelivery} AS delivery`

const listLetters = (
  condition: string,
  parameters: SqlParameters,
  slice: PageSlice,
): Promise<PageOf<LetterListRow>> =>
  selectPage<LetterListRow>(
    {
      select: listColumns,
      from: `FROM letters l JOIN children c ON c.id = l.childId JOIN users a ON a.id = l.authorId
        LEFT JOIN letter_versions v ON v.id = l.approvedVersionId LEFT JOIN users p ON p.id = v.approvedById
        WHERE l.discardedAt IS NULL AND ${condition}`,
      orderBy: 'l.changedAt DESC, l.id',
      parameters,
    },
    slice,
  )

/** Letters of one child, newest first. */
export const listLettersOfChild = (access: ChildAccess, slice: PageSlice): Promise<PageOf<LetterListRow>> => {
  const scope = within(access, 'l.childId')
  return listLetters(scope.sql, scope.parameters, slice)
}

/** Letters of every child the viewer holds; a lead sees the clinic's. */
export const listLettersOfViewer = (
  viewer: Viewer,
  { state, search, ...slice }: LetterListRequest,
): Promise<PageOf<LetterListRow>> => {
  const scope = staffScope(viewer, 'l.childId', ['assignedTherapist', 'clinicLead'])
  const conditions = [scope.sql]
  const parameters: SqlParameters = { ...scope.parameters }
  if (state !== null) {
    conditions.push('l.state = :state')
    parameters.state = state
  }
  if (search !== null) {
    const words = matchesWords(search)
    conditions.push(words.sql)
    Object.assign(parameters, words.parameters)
  }
  return listLetters(conditions.join(' AND '), parameters, slice)
}

export interface RecipientRow {
  guardianId: string
  name: string
  relation: GuardianRelation
  email: string | null
  restricted: boolean
  safeToContact: boolean
  hasAccount: boolean
  link: boolean
  attachment: boolean
}

/** Carers of the child with what decides how a letter may reach each of them. */
export const listRecipients = async (access: ChildAccess, tx?: Tx): Promise<RecipientRow[]> => {
  const scope = within(access, 'g.childId')
  const rows = await selectRows<Record<keyof RecipientRow, unknown>>(
    `SELECT g.id AS guardianId, g.name, g.relation, g.email, g.restricted, g.safeToContact,
       (u.passwordHash IS NOT NULL AND u.disabledAt IS NULL) AS hasAccount,
       ${emailConsent('email_link')} AS link, ${emailConsent('email_attachment')} AS attachment
     FROM guardians g LEFT JOIN users u ON u.id = g.userId
     WHERE g.endedAt IS NULL AND ${scope.sql} ORDER BY g.createdAt, g.id`,
    { ...scope.parameters, now: now() },
    tx,
  )
  return rows.map((row) => ({
    guardianId: row.guardianId as string,
    name: row.name as string,
    relation: row.relation as GuardianRelation,
    email: row.email as string | null,
    restricted: flag(row.restricted as number),
    safeToContact: flag(row.safeToContact as number),
    hasAccount: flag((row.hasAccount ?? 0) as number),
    link: flag(row.link as number),
    attachment: flag(row.attachment as number),
  }))
}

export interface DeliveryRow {
  id: string
  guardianId: string
  recipient: string
  channel: 'link' | 'attachment'
  state: DeliveryState
  attempts: number
  lastTriedAt: Date | null
  nextAttemptAt: Date
  problem: string | null
  openedAt: Date | null
}

export const listDeliveries = (access: ChildAccess, letterId: string): Promise<DeliveryRow[]> => {
  const scope = within(access, 'l.childId')
  return selectRows<DeliveryRow>(
    `SELECT d.id, d.guardianId, g.name AS recipient, d.channel, d.state, m.attempts, m.lastTriedAt, m.nextAttemptAt, m.problem, d.openedAt
     FROM letter_deliveries d JOIN letters l ON l.id = d.letterId JOIN guardians g ON g.id = d.guardianId
       JOIN outbox_messages m ON m.id = d.outboxMessageId
     WHERE d.letterId = :letterId AND ${scope.sql} ORDER BY d.createdAt, d.id`,
    { letterId, ...scope.parameters },
  )
}

/**
 * Names that would betray another child if they stood in this letter: of the child's class, of the caseload of the
 * child's therapist, and of brothers and sisters (children of one carer's account). Whole names first, then each part
 * of three letters or more. The viewer need not hold those children: a name is only compared with what they wrote.
 */
export const listOtherNames = async (access: ChildAccess): Promise<string[]> => {
  const scope = within(access, 'c.id')
  const rows = await selectRows<{ givenName: string; preferredName: string | null; familyName: string }>(
    `WITH near AS (
       SELECT m.id FROM children c JOIN children m ON m.schoolClassId = c.schoolClassId WHERE ${scope.sql}
       UNION SELECT h.childId FROM children c JOIN assignments t ON t.childId = c.id AND ${runsAt('t')}
         JOIN assignments h ON h.therapistId = t.therapistId AND ${runsAt('h')} WHERE ${scope.sql}
       UNION SELECT s.childId FROM children c JOIN guardians g ON g.childId = c.id
         JOIN guardians s ON s.userId = g.userId WHERE ${scope.sql})
     SELECT o.givenName, o.preferredName, o.familyName FROM near JOIN children o ON o.id = near.id
     WHERE o.id <> :childId`,
    { childId: access.childId, now: now(), ...scope.parameters },
  )
  return rows.flatMap((row) => [
    ...wholeNames(row),
    ...[row.givenName, row.preferredName, row.familyName].filter(
      (name): name is string => name !== null && [...name].length > 2,
    ),
  ])
}

/** The approved PDF with the hash it must have. */
export const findLetterPdf = async (access: ChildAccess, id: string) => {
  const scope = within(access, 'l.childId')
  if (!isId(id)) throw notFound()
  const row = await selectOne<{ pdf: Buffer; pdfSha256: Buffer }>(
    `SELECT v.pdf, v.pdfSha256 FROM letters l JOIN letter_versions v ON v.id = l.approvedVersionId
     WHERE l.id = :id AND l.discardedAt IS NULL AND ${scope.sql}`,
    { id, ...scope.parameters },
  )
  if (!row) throw notFound()
  return row
}
