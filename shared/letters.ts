import { array, object, string, type InferType } from 'yup'
import { optionalDayField, type Day } from './days.ts'
import { body, choice, id, text, tidy } from './fields.ts'
import type { Page } from './pages.ts'

export const letterKinds = ['progress'] as const
export type LetterKind = (typeof letterKinds)[number]
export const letterKindLabels: Record<LetterKind, string> = { progress: 'Progress letter' }

export const letterStates = ['draft', 'awaiting_approval', 'approved', 'queued', 'sent', 'recalled'] as const
export type LetterState = (typeof letterStates)[number]
export const letterStateLabels: Record<LetterState, string> = {
  draft: 'Draft',
  awaiting_approval: 'Waiting for approval',
  approved: 'Approved, not sent',
  queued: 'On its way',
  sent: 'Sent',
  recalled: 'Recalled',
}

export const deliveryStates = ['queued', 'sending', 'sent', 'opened', 'failed', 'cancelled'] as const
export type DeliveryState = (typeof deliveryStates)[number]
export const deliveryStateLabels: Record<DeliveryState, string> = {
  queued: 'Waiting to go',
  sending: 'Being sent',
  sent: 'Sent',
  opened: 'Read by the family',
  failed: 'Could not be delivered',
  cancelled: 'Cancelled',
}

/** Sections of the progress letter, in order. Text is plain: blank line = new paragraph, '- ' = list item. */
export const letterSectionIds = [
  'opening',
  'strengths',
  'work',
  'changes',
  'goals',
  'home',
  'school',
  'next',
  'wrong',
] as const
export type LetterSectionId = (typeof letterSectionIds)[number]

export interface LetterSection {
  id: LetterSectionId
  heading: string
  text: string
}

const sectionSchema = object({
  id: choice('a section of the letter', letterSectionIds),
  heading: text('The heading', { max: 120 }),
  /** May be empty while a draft: an empty section is left out of the printed letter. */
  text: string()
    .transform(tidy)
    .defined('The section is missing')
    .max(4000, 'A section can be at most 4000 characters'),
}).noUnknown()

/** Asks for a letter; its text is assembled from the record. */
export const newLetterSchema = body({ kind: choice('the kind of letter', letterKinds) })

export const letterDraftSchema = body({
  salutation: text('The greeting', { max: 120 }),
  sections: array(sectionSchema).required().min(1).max(letterSectionIds.length),
  nextVisitOn: optionalDayField('The next date'),
})
export type LetterDraft = { salutation: string; sections: LetterSection[]; nextVisitOn: Day | null }

export const letterApprovalSchema = body({
  /** Reasons for keeping discouraged words, by hit id. Blocked words cannot be kept. */
  overrides: array(
    object({
      phrase: text('The words', { max: 120 }),
      reason: text('The reason', { min: 5, max: 300 }),
    }).noUnknown(),
  )
    .required()
    .max(20),
})
export type LetterApproval = InferType<typeof letterApprovalSchema>

export const letterReturnSchema = body({ reason: text('What to change', { min: 5, max: 1000 }) })
export type LetterReturn = InferType<typeof letterReturnSchema>

export const letterSendSchema = body({
  guardianIds: array(id('The carer')).required().min(1, 'Choose at least one carer').max(6),
})
export type LetterSend = InferType<typeof letterSendSchema>

/** One fact the draft was assembled from, with where it came from in the record. */
export interface LetterFact {
  section: LetterSectionId
  text: string
  source: string
}

/** One finding of the checker. `blocked` stops approval; `discouraged` needs a reason; `advice` only informs. */
export interface LetterFinding {
  level: 'blocked' | 'discouraged' | 'advice'
  section: LetterSectionId | 'salutation' | 'letter'
  phrase: string | null
  message: string
  instead: string[]
}

export interface LetterChecks {
  findings: LetterFinding[]
  reading: { ease: number | null; grade: number | null; words: number; longestSentence: string | null }
}

export interface LetterRecipient {
  guardianId: string
  name: string
  relation: string
  /** How a letter would reach this carer now. */
  channel: 'link' | 'attachment' | null
  /** Why nothing can be sent by e-mail, in words. */
  why: string | null
}

export interface DeliveryView {
  id: string
  guardianId: string
  recipient: string
  channel: 'link' | 'attachment'
  state: DeliveryState
  attempts: number
  lastTriedAt: string | null
  nextTryAt: string | null
  problem: string | null
  openedAt: string | null
  can: { retry: boolean }
}

/** A copy that has reached this carer, or will without anybody doing anything. */
export const isArriving = ({ state }: Pick<DeliveryView, 'state'>): boolean =>
  ['queued', 'sending', 'sent', 'opened'].includes(state)

/** Carers who can be written to by e-mail now and for whom no copy is on its way or there. */
export const recipientsStillWithout = ({
  recipients,
  deliveries,
}: {
  recipients: readonly LetterRecipient[]
  deliveries: readonly Pick<DeliveryView, 'guardianId' | 'state'>[]
}): LetterRecipient[] =>
  recipients.filter(
    ({ guardianId, channel }) =>
      channel !== null && !deliveries.some((copy) => copy.guardianId === guardianId && isArriving(copy)),
  )

export interface LetterRow {
  id: string
  childId: string
  childName: string
  recordNumber: string
  kind: LetterKind
  state: LetterState
  author: string
  approver: string | null
  changedAt: string
  sentAt: string | null
  delivery: DeliveryState | null
}
export type LetterPage = Page<LetterRow>

export interface LetterView extends LetterDraft {
  id: string
  childId: string
  childName: string
  recordNumber: string
  kind: LetterKind
  state: LetterState
  author: string
  approver: string | null
  approvedAt: string | null
  returnedReason: string | null
  facts: LetterFact[]
  checks: LetterChecks
  recipients: LetterRecipient[]
  deliveries: DeliveryView[]
  pdf: { bytes: number; sha256: string } | null
  version: number
  can: {
    change: boolean
    submit: boolean
    approve: boolean
    return: boolean
    /** Open a submitted or approved, unsent letter for changes. */
    takeBack: boolean
    send: boolean
    recall: boolean
    discard: boolean
  }
}

/** The letter as a carer reads it. */
export interface ReceivedLetter extends Pick<LetterDraft, 'salutation' | 'sections'> {
  id: string
  childId: string
  childName: string
  kind: LetterKind
  sentAt: string
  author: string
  clinic: { name: string; address: string; phone: string }
}

export interface ReceivedLetterRow {
  id: string
  childId: string
  kind: LetterKind
  sentAt: string
  openedAt: string | null
}
