import type { Day } from '../../shared/days.ts'
import type { NoteDraft, NoteState, SessionType } from '../../shared/sessionNotes.ts'
import { isId } from '../../shared/fields.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { selectPage, type PageOf, type PageSlice } from './pages.ts'
import { within } from './scope.ts'
import { count, flag, fromJson, selectOne, selectRows } from './sql.ts'

export interface NoteListRow {
  id: string
  heldOn: Day
  type: SessionType
  minutes: number
  author: string
  state: NoteState
  lateReason: string | null
  addenda: number
  summary: string
}

/** One page of a child's notes, the latest session first; discarded drafts are left out. */
export const listNotes = async (access: ChildAccess, slice: PageSlice): Promise<PageOf<NoteListRow>> => {
  const scope = within(access, 'n.childId')
  const found = await selectPage<Omit<NoteListRow, 'addenda'> & { addenda: string }>(
    {
      select: `n.id, n.heldOn, n.type, n.minutes, u.displayName AS author, n.state, s.lateReason, n.summary,
        (SELECT COUNT(*) FROM note_addenda d WHERE d.noteId = n.id) AS addenda`,
      from: `FROM session_notes n JOIN users u ON u.id = n.authorId
        LEFT JOIN note_signatures s ON s.noteId = n.id AND s.kind = 'author'
        WHERE n.discardedAt IS NULL AND ${scope.sql}`,
      orderBy: 'n.heldOn DESC, n.startTime DESC, n.createdAt DESC, n.id',
      parameters: scope.parameters,
    },
    slice,
  )
  return { total: found.total, rows: found.rows.map((row) => ({ ...row, addenda: count(row.addenda) })) }
}

interface StoredNote {
  id: string
  childId: string
  authorId: string
  author: string
  state: NoteState
  content: string
  signedAt: Date | null
  signedById: string | null
  signedBy: string | null
  textHash: Buffer | null
  lateReason: string | null
  countersignedAt: Date | null
  countersignedBy: string | null
  revisions: string
  writtenByViewer: number
  version: number
}

export interface NoteRecord extends Omit<StoredNote, 'content' | 'revisions' | 'writtenByViewer'> {
  content: NoteDraft
  revisions: number
  writtenByViewer: boolean
  addenda: { id: string; text: string; by: string; at: Date }[]
  previousPlan: { heldOn: Day; text: string } | null
}

const listAddenda = (access: ChildAccess, noteId: string, tx?: Tx): Promise<NoteRecord['addenda']> => {
  const scope = within(access, 'n.childId')
  return selectRows(
    `SELECT d.id, d.text, u.displayName AS \`by\`, d.at FROM note_addenda d
       JOIN session_notes n ON n.id = d.noteId JOIN users u ON u.id = d.byId
     WHERE d.noteId = :noteId AND ${scope.sql} ORDER BY d.at, d.id`,
    { ...scope.parameters, noteId },
    tx,
  )
}

/** The plan of the signed note of the session before. */
const findPreviousPlan = async (
  access: ChildAccess,
  { heldOn, startTime }: NoteDraft,
  tx?: Tx,
): Promise<NoteRecord['previousPlan']> => {
  const scope = within(access, 'n.childId')
  const row = await selectOne<{ heldOn: Day; content: string }>(
    `SELECT n.heldOn, r.content FROM session_notes n
       JOIN note_signatures s ON s.noteId = n.id AND s.kind = 'author' JOIN note_revisions r ON r.id = s.revisionId
     WHERE (n.heldOn < :heldOn OR (n.heldOn = :heldOn AND n.startTime < :startTime)) AND ${scope.sql}
     ORDER BY n.heldOn DESC, n.startTime DESC, n.id LIMIT 1`,
    { ...scope.parameters, heldOn, startTime },
    tx,
  )
  return row && { heldOn: row.heldOn, text: fromJson<NoteDraft>(row.content).plan }
}

/** A note with the text that was signed or, while it is a draft, the text saved last. */
export const findNote = async (access: ChildAccess, id: string, tx?: Tx): Promise<NoteRecord> => {
  if (!isId(id)) throw notFound()
  const scope = within(access, 'n.childId')
  const row = await selectOne<StoredNote>(
    `SELECT n.id, n.childId, n.authorId, a.displayName AS author, n.state, r.content, s.signedAt, s.signedById,
       su.displayName AS signedBy, s.textHash, s.lateReason, c.signedAt AS countersignedAt,
       cu.displayName AS countersignedBy, n.version,
       (SELECT COUNT(*) FROM note_revisions x WHERE x.noteId = n.id) AS revisions,
       EXISTS (SELECT 1 FROM note_revisions w WHERE w.noteId = n.id AND w.byId = :viewer) AS writtenByViewer
     FROM session_notes n
     JOIN users a ON a.id = n.authorId
     LEFT JOIN note_signatures s ON s.noteId = n.id AND s.kind = 'author'
     LEFT JOIN users su ON su.id = s.signedById
     LEFT JOIN note_signatures c ON c.noteId = n.id AND c.kind = 'countersignature'
     LEFT JOIN users cu ON cu.id = c.signedById
     JOIN note_revisions r ON r.id = COALESCE(s.revisionId,
       (SELECT l.id FROM note_revisions l WHERE l.noteId = n.id ORDER BY l.revision DESC LIMIT 1))
     WHERE n.id = :noteId AND n.discardedAt IS NULL AND ${scope.sql}`,
    { ...scope.parameters, noteId: id, viewer: access.viewer.id },
    tx,
  )
  if (!row) throw notFound()
  const content = fromJson<NoteDraft>(row.content)
  return {
    ...row,
    content,
    revisions: count(row.revisions),
    writtenByViewer: flag(row.writtenByViewer),
    addenda: await listAddenda(access, id, tx),
    previousPlan: await findPreviousPlan(access, content, tx),
  }
}

export interface RevisionRow {
  id: string
  revision: number
  by: string
  at: Date
  content: NoteDraft
}

/** Saved texts of a note, the newest first. */
export const listRevisions = async (
  access: ChildAccess,
  noteId: string,
  { size, offset }: { size: number; offset: number },
): Promise<RevisionRow[]> => {
  if (!isId(noteId)) throw notFound()
  const scope = within(access, 'n.childId')
  const rows = await selectRows<Omit<RevisionRow, 'content'> & { content: string }>(
    `SELECT r.id, r.revision, u.displayName AS \`by\`, r.at, r.content FROM note_revisions r
       JOIN session_notes n ON n.id = r.noteId JOIN users u ON u.id = r.byId
     WHERE r.noteId = :noteId AND n.discardedAt IS NULL AND ${scope.sql}
     ORDER BY r.revision DESC LIMIT :size OFFSET :offset`,
    { ...scope.parameters, noteId, size, offset },
  )
  return rows.map((row) => ({ ...row, content: fromJson<NoteDraft>(row.content) }))
}
