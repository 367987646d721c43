import type { LetterDraft, LetterKind, LetterState, DeliveryState } from '../../shared/letters.ts'
import { isId } from '../../shared/fields.ts'
import type { Viewer } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { notFound } from '../errors.ts'
import { calledName } from './names.ts'
import { childScope, ownLink, within } from './scope.ts'
import { fromJson, selectOne, selectRows } from './sql.ts'

export interface ReceivedLetterListRow {
  id: string
  childId: string
  kind: LetterKind
  sentAt: Date
  openedAt: Date | null
}

// What reached this carer: sent to one of their own rows and not recalled since.
const received = `letter_deliveries d JOIN letters l ON l.id = d.letterId AND l.state <> 'recalled'
  JOIN outbox_messages m ON m.id = d.outboxMessageId AND m.sentAt IS NOT NULL
  JOIN guardians g ON g.id = d.guardianId AND g.childId = l.childId AND ${ownLink('g')}`
const arrived = "d.state IN ('sent', 'opened')"

/** How many letters that reached this carer about the child of `column` they have not opened here. */
export const unreadLetters = (column: string): string => `(SELECT COUNT(DISTINCT d.letterId)
    - COUNT(DISTINCT IF(d.openedAt IS NULL, NULL, d.letterId)) FROM ${received}
  WHERE ${arrived} AND l.childId = ${column})`

/** Letters that reached this carer, newest first. */
export const listReceivedLetters = (access: ChildAccess): Promise<ReceivedLetterListRow[]> => {
  const scope = within(access, 'l.childId')
  return selectRows<ReceivedLetterListRow>(
    `SELECT l.id, l.childId, l.kind, MIN(m.sentAt) AS sentAt, MIN(d.openedAt) AS openedAt FROM ${received}
     WHERE ${arrived} AND ${scope.sql} GROUP BY l.id, l.childId, l.kind ORDER BY sentAt DESC, l.id`,
    scope.parameters,
  )
}

export interface ReceivedLetterRecord extends ReceivedLetterListRow {
  deliveryId: string
  childName: string
  author: string
  /** Exactly what was approved, never the draft. */
  content: LetterDraft
}

/** A letter that reached the viewer, as it was approved. */
export const findReceivedLetter = async (viewer: Viewer, letterId: string): Promise<ReceivedLetterRecord> => {
  if (!isId(letterId)) throw notFound()
  const scope = childScope(viewer, 'guardian', 'l.childId')
  const row = await selectOne<Omit<ReceivedLetterRecord, 'content'> & { content: string }>(
    `SELECT l.id, l.childId, ${calledName('c')} AS childName, l.kind,
       m.sentAt, d.openedAt, d.id AS deliveryId, a.displayName AS author, v.content
     FROM ${received} JOIN letter_versions v ON v.id = d.letterVersionId
       JOIN children c ON c.id = l.childId JOIN users a ON a.id = l.authorId
     WHERE l.id = :letterId AND ${arrived} AND ${scope.sql} ORDER BY m.sentAt DESC, d.id LIMIT 1`,
    { letterId, ...scope.parameters },
  )
  if (!row) throw notFound()
  return { ...row, content: fromJson<LetterDraft>(row.content) }
}

/** The approved PDF of a delivery that reached the viewer. */
export const findReceivedPdf = async (viewer: Viewer, deliveryId: string): Promise<Buffer> => {
  const scope = childScope(viewer, 'guardian', 'l.childId')
  const row = await selectOne<{ pdf: Buffer }>(
    `SELECT v.pdf FROM ${received} JOIN letter_versions v ON v.id = d.letterVersionId
     WHERE d.id = :deliveryId AND ${arrived} AND ${scope.sql}`,
    { deliveryId, ...scope.parameters },
  )
  if (!row) throw notFound()
  return row.pdf
}

export interface OwnDeliveryRecord {
  id: string
  letterId: string
  childId: string
  state: DeliveryState
  letterState: LetterState
  linkEndsAt: Date
}

/** A delivery to one of the viewer's own rows, whatever became of it. */
export const findOwnDelivery = async (viewer: Viewer, deliveryId: string): Promise<OwnDeliveryRecord> => {
  if (!isId(deliveryId)) throw notFound()
  const scope = childScope(viewer, 'guardian', 'l.childId')
  const row = await selectOne<OwnDeliveryRecord>(
    `SELECT d.id, d.letterId, l.childId, d.state, l.state AS letterState, d.linkEndsAt
     FROM letter_deliveries d JOIN letters l ON l.id = d.letterId
       JOIN guardians g ON g.id = d.guardianId AND g.childId = l.childId AND ${ownLink('g')}
     WHERE d.id = :deliveryId AND ${scope.sql}`,
    { deliveryId, ...scope.parameters },
  )
  if (!row) throw notFound()
  return row
}
