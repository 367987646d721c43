import type { NoteRevisionView, NoteRow, NoteView } from '../../shared/sessionNotes.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import {
  canAddAddendum,
  canChangeNote,
  canCountersignNote,
  canDiscardNote,
  canSignNote,
} from '../policies/sessionNotes.ts'
import type { NoteListRow, NoteRecord, RevisionRow } from '../queries/sessionNotes.ts'

export const presentNoteRow = (row: NoteListRow): NoteRow => ({
  id: row.id,
  heldOn: row.heldOn,
  type: row.type,
  minutes: row.minutes,
  author: row.author,
  state: row.state,
  lateEntry: row.lateReason !== null,
  addenda: row.addenda,
  summary: row.summary,
})

export const presentNote = (note: NoteRecord, access: ChildAccess): NoteView => ({
  id: note.id,
  childId: note.childId,
  author: note.author,
  heldOn: note.content.heldOn,
  startTime: note.content.startTime,
  minutes: note.content.minutes,
  type: note.content.type,
  present: note.content.present,
  assent: note.content.assent,
  said: note.content.said,
  observed: note.content.observed,
  meaning: note.content.meaning,
  plan: note.content.plan,
  goalIds: note.content.goalIds,
  state: note.state,
  signedAt: note.signedAt?.toISOString() ?? null,
  signedBy: note.signedBy,
  countersignedAt: note.countersignedAt?.toISOString() ?? null,
  countersignedBy: note.countersignedBy,
  textHash: note.textHash?.toString('hex') ?? null,
  lateEntry: note.lateReason !== null,
  lateReason: note.lateReason,
  addenda: note.addenda.map(({ id, text, by, at }) => ({ id, text, by, at: at.toISOString() })),
  revisions: note.revisions,
  previousPlan: note.previousPlan && { heldOn: note.previousPlan.heldOn, text: note.previousPlan.text },
  version: note.version,
  can: {
    change: canChangeNote(access, note),
    sign: canSignNote(access, note),
    countersign: canCountersignNote(access, note),
    addAddendum: canAddAddendum(access, note),
    discard: canDiscardNote(access, note),
  },
})

export const presentRevision = ({ revision, by, at, content }: RevisionRow): NoteRevisionView => ({
  revision,
  by,
  at: at.toISOString(),
  said: content.said,
  observed: content.observed,
  meaning: content.meaning,
  plan: content.plan,
})
