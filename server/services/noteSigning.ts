import { createHash, randomUUID } from 'node:crypto'
import { isLateEntry, momentOf } from '../../shared/clinicTime.ts'
import { canonicalNote, missingFromNote, type NoteDraft, type SignNote } from '../../shared/sessionNotes.ts'
import type { Actor, Viewer } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { NoteRevision } from '../entities/NoteRevision.ts'
import { NoteSignature } from '../entities/NoteSignature.ts'
import { SessionNote } from '../entities/SessionNote.ts'
import { conflict, forbidden, invalid } from '../errors.ts'
import { canSignNote, mayCountersign } from '../policies/sessionNotes.ts'
import { findForChild } from '../queries/scope.ts'
import { noteFact, openDraft } from './sessionNotes.ts'
import { readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { StaleWrite, updateIfCurrent } from './versions.ts'

const hashOf = (noteId: string, childId: string, content: NoteDraft): Buffer =>
  createHash('sha256')
    .update(canonicalNote(noteId, childId, content), 'utf8')
    .digest()

/** In which capacity somebody signs, as it stands beside the signature for ever. */
const signedRole = (access: ChildAccess, { newlyQualified }: Viewer) => {
  if (access.relation === 'clinicLead') return 'clinicLead'
  return newlyQualified ? 'newlyQualifiedTherapist' : 'therapist'
}

const wroteSomeOf = (tx: Tx, noteId: string, viewer: Viewer): Promise<boolean> =>
  tx.existsBy(NoteRevision, { noteId, byId: viewer.id })

/** What keeps this text from being signed now; empty when nothing does. */
const signingProblems = (content: NoteDraft, { lateReason }: SignNote, timeZone: string) => {
  const problems = missingFromNote(content)
  if (momentOf(content.heldOn, content.startTime, timeZone) > now())
    problems.startTime = 'This session has not begun yet'
  if (isLateEntry(content.heldOn, now(), timeZone) && lateReason === null)
    problems.lateReason = 'The session was on an earlier day: say why it is written down only now'
  return problems
}

/**
 * Signs a draft in one transaction: hash of the canonical text, person, capacity, server time and zone. The note is then
 * closed; one by a newly qualified person waits for a countersignature. Throws StaleWrite when the text changed since.
 */
export const signNote = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
  signature: SignNote,
): Promise<void> => {
  const { viewer } = access
  const { timeZone } = await readSettings()
  await transact(actor, async (tx, record) => {
    const note = await openDraft(tx, access, id)
    if (note.version !== version) throw new StaleWrite()
    const writtenByViewer = await wroteSomeOf(tx, id, viewer)
    if (!canSignNote(access, { ...note, signedById: null, writtenByViewer }))
      throw forbidden('Only a person who wrote this note can sign it.')
    const { id: revisionId, content } = await tx.findOneByOrFail(NoteRevision, {
      noteId: id,
      revision: version,
    })
    const problems = signingProblems(content, signature, timeZone)
    if (Object.keys(problems).length > 0) throw invalid(problems)

    const state = viewer.newlyQualified ? 'awaiting_countersignature' : 'signed'
    const textHash = hashOf(id, access.childId, content)
    await updateIfCurrent(tx, SessionNote, id, version, { state })
    await tx.insert(NoteSignature, {
      id: randomUUID(),
      noteId: id,
      revisionId,
      kind: 'author',
      signedById: viewer.id,
      signedRole: signedRole(access, viewer),
      signedAt: now(),
      timeZone,
      textHash,
      lateReason: isLateEntry(content.heldOn, now(), timeZone) ? signature.lateReason : null,
    })
    record({ ...noteFact(access, 'signed', id), detail: { state, textHash: textHash.toString('hex') } })
  })
}

/** The second signature under a newly qualified person's note: same text, checked against the hash of the first. */
export const countersignNote = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> => {
  const { timeZone } = await readSettings()
  await transact(actor, async (tx, record) => {
    const note = await findForChild(access, SessionNote, id, tx, { lock: true })
    if (note.state !== 'awaiting_countersignature')
      throw conflict('closed', 'This note is not waiting for a countersignature.')
    const first = await tx.findOneByOrFail(NoteSignature, { noteId: id, kind: 'author' })
    if (!mayCountersign(access, { authorId: note.authorId, signedById: first.signedById }))
      throw forbidden('A second, experienced person countersigns: never the author.')
    if (note.version !== version) throw new StaleWrite()
    const { content } = await tx.findOneByOrFail(NoteRevision, { id: first.revisionId })
    if (!hashOf(id, access.childId, content).equals(first.textHash))
      throw conflict(
        'damaged',
        'The stored text is not the one that was signed. Tell the clinic lead at once.',
      )

    await updateIfCurrent(tx, SessionNote, id, version, { state: 'signed' })
    await tx.insert(NoteSignature, {
      id: randomUUID(),
      noteId: id,
      revisionId: first.revisionId,
      kind: 'countersignature',
      signedById: access.viewer.id,
      signedRole: signedRole(access, access.viewer),
      signedAt: now(),
      timeZone,
      textHash: first.textHash,
      lateReason: null,
    })
    record(noteFact(access, 'countersigned', id))
  })
}
