import { randomUUID } from 'node:crypto'
import { sessionEnd } from '../../shared/clinicTime.ts'
import { noteSummary, type Addendum, type NoteDraft } from '../../shared/sessionNotes.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { NoteAddendum } from '../entities/NoteAddendum.ts'
import { NoteRevision } from '../entities/NoteRevision.ts'
import { SessionNote } from '../entities/SessionNote.ts'
import { conflict, forbidden, invalid } from '../errors.ts'
import { canDiscardNote } from '../policies/sessionNotes.ts'
import { findForChild, within } from '../queries/scope.ts'
import { findNote, type NoteRecord } from '../queries/sessionNotes.ts'
import { selectRows } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { requirePastDay } from './recordRules.ts'
import { readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { updateIfCurrent } from './versions.ts'

export const noteFact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action: `sessionNote.${action}`,
  objectType: 'sessionNote',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

/** The note for writing, in its newest state and held until the transaction ends. Signed and discarded ones refuse. */
export const openDraft = async (tx: Tx, access: ChildAccess, id: string): Promise<SessionNote> => {
  const note = await findForChild(access, SessionNote, id, tx, { lock: true })
  if (note.state !== 'draft')
    throw conflict('closed', 'This note is signed and stays as it is. Add what is new as an addendum.')
  if (note.discardedAt !== null)
    throw conflict('closed', 'This draft was discarded. Start a new note; your text is still on this page.')
  return note
}

const headOf = (draft: NoteDraft, timeZone: string) => ({
  heldOn: draft.heldOn,
  startTime: draft.startTime,
  minutes: draft.minutes,
  endedAt: sessionEnd(draft, timeZone),
  type: draft.type,
  summary: noteSummary(draft.plan),
})

const keepRevision = (tx: Tx, access: ChildAccess, noteId: string, revision: number, content: NoteDraft) =>
  tx.insert(NoteRevision, {
    id: randomUUID(),
    noteId,
    revision,
    content,
    byId: access.viewer.id,
    at: now(),
  })

/** A session is of today or earlier, and the goals it names are this child's. */
const checkDraft = async (access: ChildAccess, draft: NoteDraft): Promise<void> => {
  await requirePastDay(access, 'heldOn', 'The date of the session', draft.heldOn)
  if (draft.goalIds.length === 0) return
  const scope = within(access, 'g.childId')
  const known = await selectRows<{ id: string }>(
    `SELECT g.id FROM goals g WHERE g.id IN (:goalIds) AND ${scope.sql}`,
    { ...scope.parameters, goalIds: draft.goalIds },
  )
  if (new Set(draft.goalIds).size !== known.length)
    throw invalid({ goalIds: 'A goal on this note does not belong to this child. Choose the goals again.' })
}

/** Begins a note with its first saved text. Answers its id. */
export const createNote = async (
  actor: Actor,
  access: ChildAccess,
  draft: NoteDraft,
  key: string | null,
): Promise<string> => {
  await checkDraft(access, draft)
  const { timeZone } = await readSettings()
  return transact(actor, (tx, record) => {
    const request = ['sessionNote', access.childId, draft]
    const factOf = (id: string) => noteFact(access, 'created', id)
    return createOnce(tx, actor, record, { key, request }, factOf, async (noteId) => {
      await tx.insert(SessionNote, {
        id: noteId,
        childId: access.childId,
        authorId: access.viewer.id,
        ...headOf(draft, timeZone),
        state: 'draft',
        discardedAt: null,
        createdAt: now(),
      })
      await keepRevision(tx, access, noteId, 1, draft)
    })
  })
}

/**
 * Saves a draft: the text becomes a new revision, and the head follows. Revisions carry the version of the head they
 * made, so two texts can never share a number. Answers the note as this save left it, read before anybody else can save.
 * Throws StaleWrite when somebody saved in between.
 */
export const saveNote = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
  draft: NoteDraft,
): Promise<NoteRecord> => {
  await checkDraft(access, draft)
  const { timeZone } = await readSettings()
  return transact(actor, async (tx, record) => {
    await openDraft(tx, access, id)
    await updateIfCurrent(tx, SessionNote, id, version, headOf(draft, timeZone))
    await keepRevision(tx, access, id, version + 1, draft)
    record(noteFact(access, 'changed', id))
    return findNote(access, id, tx)
  })
}

/** Takes an unsigned draft off the record's pages; its texts stay in the database. Only the author may. */
export const discardNote = (actor: Actor, access: ChildAccess, id: string): Promise<void> =>
  transact(actor, async (tx, record) => {
    const note = await openDraft(tx, access, id)
    if (!canDiscardNote(access, note)) throw forbidden('Only the author can discard this draft.')
    await updateIfCurrent(tx, SessionNote, id, note.version, { discardedAt: now() })
    record(noteFact(access, 'discarded', id))
  })

/** Adds a later thought to a signed note; the signed text is not touched. */
export const addAddendum = (
  actor: Actor,
  access: ChildAccess,
  noteId: string,
  { text }: Addendum,
  key: string | null,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const note = await findForChild(access, SessionNote, noteId, tx, { lock: true })
    if (note.state === 'draft')
      throw conflict('not_signed', 'This note is not signed yet: write into the note itself.')
    const request = ['noteAddendum', noteId, text]
    const factOf = (addendum: string) => ({
      ...noteFact(access, 'addendum_added', noteId),
      detail: { addendum },
    })
    await createOnce(tx, actor, record, { key, request }, factOf, async (addendumId) => {
      await tx.insert(NoteAddendum, { id: addendumId, noteId, text, byId: access.viewer.id, at: now() })
    })
  })
