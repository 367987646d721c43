import { boolean, type InferType } from 'yup'
import type { Attention } from './attention.ts'
import { dayField, optionalDayField, type Day } from './days.ts'
import type { EpisodeState, StateChangeView } from './episodes.ts'
import { body, choice, optionalChoice, optionalId, optionalText, text } from './fields.ts'
import type { LateralLineRow } from './lateralLine.ts'
import type { RedFlagUrgency } from './redFlagRows.ts'
import { scriptDirections, type ReferralConcern, type ScriptDirection } from './referrals.ts'
import type { ChildRelation } from './roles.ts'

export const writingHands = ['left', 'right', 'swaps'] as const
export type WritingHand = (typeof writingHands)[number]
export const writingHandLabels: Record<WritingHand, string> = { left: 'Left', right: 'Right', swaps: 'Swaps' }

export const childIdentitySchema = body({
  givenName: text('The given name', { max: 80 }),
  familyName: text('The family name', { max: 80 }),
  preferredName: optionalText('The preferred name', { max: 80 }),
  birthDate: dayField('The date of birth'),
  homeLanguages: optionalText('Home languages', { max: 120 }),
  interpreterLanguage: optionalText('The interpreter’s language', { max: 60 }),
  scriptDirection: choice('the direction of writing', scriptDirections),
  classId: optionalId('The class'),
  lookedAfter: boolean().required(),
  consentsForSelf: boolean().required(),
})
export type ChildIdentity = InferType<typeof childIdentitySchema>

/** What the therapist keeps on the child beyond identity. */
export const careSchema = body({
  writingHand: optionalChoice('the writing hand', writingHands),
  nextReviewOn: optionalDayField('The next review'),
  /** One thing a line; letters to the family begin with them. */
  strengths: optionalText('What the child enjoys and does well', { max: 1000 }),
})
export type CareDetails = InferType<typeof careSchema>

/** Head of every page of a record: enough to be sure it is the right child. */
export interface ChildHeader {
  id: string
  recordNumber: string
  name: string
  preferredName: string | null
  birthDate: Day
  age: string
  relation: ChildRelation
  school: string | null
  className: string | null
  interpreterLanguage: string | null
  lookedAfter: boolean
  courtOrder: boolean
  consentsForSelf: boolean
  /** Null for an administrator, who sees identity and contact only. */
  state: EpisodeState | null
  therapist: string | null
  alerts: {
    id: string
    text: string
    level: Attention
    urgency: RedFlagUrgency
    /** What is usually done; null where the text says it. */
    advice: string | null
    raisedAt: string
  }[]
  /** What the clinic tells families to do in an emergency, while a sign that needs help the same day is open. */
  emergencyText: string | null
  /** The age counted from the due date, for a young child born early; null where it is not used. */
  correctedAge: string | null
  /** Sections of the record this viewer may open. */
  sections: RecordSection[]
  /** Another child with the same name is on the register: tell them apart by birth date and record number. */
  namesake: boolean
  can: { writeNote: boolean; startLetter: boolean }
}

export const recordSections = [
  'glance',
  'hand-profile',
  'handwriting',
  'goals',
  'sessions',
  'letters',
  'school',
  'family',
  'access',
] as const
export type RecordSection = (typeof recordSections)[number]
export const recordSectionLabels: Record<RecordSection, string> = {
  glance: 'At a glance',
  'hand-profile': 'Hand profile',
  handwriting: 'Handwriting',
  goals: 'Goals',
  sessions: 'Sessions',
  letters: 'Letters',
  school: 'School',
  family: 'Family and consent',
  access: 'Access history',
}

export interface TaskView {
  id: string
  text: string
  dueOn: Day | null
  level: Attention
  childId: string | null
  childName: string | null
  can: { finish: boolean }
}

export interface GlanceView {
  child: ChildHeader
  writingHand: WritingHand | null
  strengths: string | null
  scriptDirection: ScriptDirection
  homeLanguages: string | null
  reason: string | null
  concerns: ReferralConcern[]
  receivedOn: Day | null
  nextReviewOn: Day | null
  tasks: TaskView[]
  lateralLine: LateralLineRow[]
  lastNote: { id: string; heldOn: Day; plan: string; signed: boolean } | null
  goals: { id: string; text: string; level: number | null }[]
  lastSample: {
    id: string
    takenOn: Day
    lettersPerMinute: number | null
    percentLegible: number | null
  } | null
  lastLetter: { id: string; state: string; at: string } | null
  consentMissing: string[]
  history: StateChangeView[]
  episodeVersion: number | null
  version: number
  nextStates: EpisodeState[]
  can: { changeState: boolean; changeCare: boolean; allocate: boolean; changeIdentity: boolean }
}

/** Identity page for those who may change it. */
export interface ChildIdentityView extends ChildIdentity {
  id: string
  recordNumber: string
  version: number
  can: { change: boolean }
}

export const allocationSchema = body({
  therapistId: optionalId('The therapist'),
  reason: text('The reason', { min: 2, max: 500 }),
})
export type Allocation = InferType<typeof allocationSchema>

/** One line of the find-a-child box. */
export interface FoundChild {
  id: string
  recordNumber: string
  name: string
  birthDate: Day
  school: string | null
}

/** A line of the administrator's register: identity and contact, no clinical field. */
export interface RegisterRow extends FoundChild {
  className: string | null
  therapist: string | null
  carers: number
}
