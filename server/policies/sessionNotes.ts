import type { NoteState } from '../../shared/sessionNotes.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation } from './policy.ts'

const read = (name: string) => childPolicy(name, ['assignedTherapist', 'clinicLead'], 'read')
const byTherapist = (name: string) => childPolicy(name, ['assignedTherapist'], 'write', ['clinicLead'])
const byTherapistOrLead = (name: string) => childPolicy(name, ['assignedTherapist', 'clinicLead'], 'write')

export const sessionNotePolicies = {
  list: read('sessionNotes.list'),
  read: read('sessionNote.read'),
  revisions: read('sessionNote.revisions'),
  create: byTherapist('sessionNote.create'),
  change: byTherapist('sessionNote.change'),
  discard: byTherapist('sessionNote.discard'),
  sign: byTherapist('sessionNote.sign'),
  countersign: byTherapistOrLead('sessionNote.countersign'),
  addAddendum: byTherapistOrLead('sessionNote.addAddendum'),
}

export interface NoteStanding {
  state: NoteState
  authorId: string
  /** Who signed as author; null while it is a draft. */
  signedById: string | null
  /** Did the viewer save any of its text? */
  writtenByViewer: boolean
}

export const canCreateNote = (access: ChildAccess) => isRelation(access, 'assignedTherapist')

/** Any therapist who holds the child may go on with a draft; each saved text names its writer. */
export const canChangeNote = (access: ChildAccess, { state }: Pick<NoteStanding, 'state'>) =>
  isRelation(access, 'assignedTherapist') && state === 'draft'

/** Signing stands for having written it: the author, or a co-author who holds the child now. */
export const canSignNote = (access: ChildAccess, note: NoteStanding) =>
  canChangeNote(access, note) && (note.authorId === access.viewer.id || note.writtenByViewer)

export const canDiscardNote = (access: ChildAccess, note: Pick<NoteStanding, 'state' | 'authorId'>) =>
  canChangeNote(access, note) && note.authorId === access.viewer.id

/** A second, experienced person: the clinic lead or another therapist who holds the child. */
export const mayCountersign = (access: ChildAccess, note: Pick<NoteStanding, 'authorId' | 'signedById'>) =>
  isRelation(access, 'assignedTherapist', 'clinicLead') &&
  !access.viewer.newlyQualified &&
  access.viewer.id !== note.authorId &&
  access.viewer.id !== note.signedById

export const canCountersignNote = (access: ChildAccess, note: NoteStanding) =>
  note.state === 'awaiting_countersignature' && mayCountersign(access, note)

export const canAddAddendum = (access: ChildAccess, { state }: Pick<NoteStanding, 'state'>) =>
  isRelation(access, 'assignedTherapist', 'clinicLead') && state !== 'draft'
