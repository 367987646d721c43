import { array, boolean, number, string, type InferType } from 'yup'
import { dayField, type Day } from './days.ts'
import { body, choice, id, isClean, optionalText, text } from './fields.ts'
import type { Page } from './pages.ts'

export const sessionTypes = ['assessment', 'session', 'review', 'school_visit', 'phone', 'video'] as const
export type SessionType = (typeof sessionTypes)[number]
export const sessionTypeLabels: Record<SessionType, string> = {
  assessment: 'Assessment',
  session: 'Therapy session',
  review: 'Review',
  school_visit: 'School visit',
  phone: 'Phone call',
  video: 'Video call',
}

export const assents = ['willing', 'unsure', 'unwilling', 'cannot_say'] as const
export type Assent = (typeof assents)[number]
export const assentLabels: Record<Assent, string> = {
  willing: 'Willing',
  unsure: 'Unsure',
  unwilling: 'Did not want to',
  cannot_say: 'Could not say',
}

const noteText = (label: string) =>
  string()
    .defined(`${label} is missing`)
    .max(20_000, `${label} can be at most 20 000 characters`)
    .test('clean', `${label} contains characters that cannot be kept`, isClean)

/** The four parts keep the order S, O, A, P of the trade. Drafts may be empty; signing needs O, A and P. */
export const noteDraftSchema = body({
  heldOn: dayField('The date of the session'),
  startTime: string()
    .required('Enter the start time')
    .matches(/^([01]\d|2[0-3]):[0-5]\d$/, 'Enter the time as 14:05'),
  minutes: number()
    .required('Enter the minutes')
    .integer('Whole minutes')
    .min(5, 'At least 5 minutes')
    .max(240, 'At most 240 minutes'),
  type: choice('the kind of session', sessionTypes),
  present: optionalText('Who was there', { max: 300 }),
  assent: choice('the child’s assent', assents),
  said: noteText('What was said'),
  observed: noteText('What was seen'),
  meaning: noteText('What it means'),
  plan: noteText('The plan'),
  goalIds: array(id('The goal')).required().max(10),
})
export type NoteDraft = InferType<typeof noteDraftSchema>

/** What still keeps a note from being signed; empty when it may be. */
export const missingFromNote = (
  note: Pick<NoteDraft, 'observed' | 'meaning' | 'plan'>,
): Record<string, string> => {
  const missing: Record<string, string> = {}
  if (note.observed.trim() === '') missing.observed = 'Write what was seen or measured'
  if (note.meaning.trim() === '') missing.meaning = 'Write what it means'
  if (note.plan.trim() === '') missing.plan = 'Write what happens next'
  return missing
}

const summaryLength = 160

/** First words of the plan for lists, cut between words. */
export function noteSummary(plan: string): string {
  const words = plan.replace(/\s+/g, ' ').trim()
  if ([...words].length <= summaryLength) return words
  const start = [...words].slice(0, summaryLength - 1).join('')
  const lastSpace = start.lastIndexOf(' ')
  return `${lastSpace > summaryLength / 2 ? start.slice(0, lastSpace) : start}…`
}

/**
 * The one text that a signature stands for: which note of which child, then every part in a fixed order. Its SHA-256 is
 * kept with the signature, so that any later change of a word would show.
 */
export const canonicalNote = (noteId: string, childId: string, note: NoteDraft): string =>
  JSON.stringify([
    'fanflower-note.v1',
    noteId,
    childId,
    note.heldOn,
    note.startTime,
    note.minutes,
    note.type,
    note.present,
    note.assent,
    note.said,
    note.observed,
    note.meaning,
    note.plan,
    note.goalIds,
  ])

export const signNoteSchema = body({
  /** The person confirms that this is their note about this child. */
  confirmed: boolean().required().oneOf([true], 'Confirm that the note is complete and about this child'),
  /** Required when the note is written on a later day than the session. */
  lateReason: optionalText('The reason for the late entry', { max: 300 }),
})
export type SignNote = InferType<typeof signNoteSchema>

export const addendumSchema = body({ text: text('The addendum', { min: 2, max: 5000 }) })
export type Addendum = InferType<typeof addendumSchema>

export const noteStates = ['draft', 'awaiting_countersignature', 'signed'] as const
export type NoteState = (typeof noteStates)[number]

export interface NoteRow {
  id: string
  heldOn: Day
  type: SessionType
  minutes: number
  author: string
  state: NoteState
  lateEntry: boolean
  addenda: number
  /** First words of the plan. */
  summary: string
}
export type NotePage = Page<NoteRow>

export interface NoteView extends NoteDraft {
  id: string
  childId: string
  author: string
  state: NoteState
  signedAt: string | null
  signedBy: string | null
  countersignedBy: string | null
  countersignedAt: string | null
  textHash: string | null
  lateEntry: boolean
  lateReason: string | null
  addenda: { id: string; text: string; by: string; at: string }[]
  revisions: number
  /** The plan of the session before, as a prompt. */
  previousPlan: { heldOn: Day; text: string } | null
  version: number
  can: { change: boolean; sign: boolean; countersign: boolean; addAddendum: boolean; discard: boolean }
}

/** One earlier text of a draft: nothing that was saved is lost. */
export interface NoteRevisionView {
  revision: number
  by: string
  at: string
  said: string
  observed: string
  meaning: string
  plan: string
}
