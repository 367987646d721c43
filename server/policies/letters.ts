import type { LetterState } from '../../shared/letters.ts'
import { isStaff } from '../../shared/roles.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation, rolePolicy } from './policy.ts'

const team = ['assignedTherapist', 'clinicLead'] as const

export const letterPolicies = {
  listAll: rolePolicy('letters.list', ['therapist', 'clinicLead'], 'read'),
  list: childPolicy('letters.listOfChild', team, 'read'),
  read: childPolicy('letters.read', team, 'read'),
  create: childPolicy('letters.create', ['assignedTherapist'], 'write', ['clinicLead']),
  change: childPolicy('letters.change', ['assignedTherapist'], 'write', ['clinicLead']),
  check: childPolicy('letters.check', team, 'none'),
  approve: childPolicy('letters.approve', team, 'write'),
  return: childPolicy('letters.return', ['clinicLead'], 'write', ['assignedTherapist']),
  send: childPolicy('letters.send', team, 'write'),
  /** The therapist sees how a delivery stands; trying a failed one again is not theirs. */
  retry: childPolicy('letters.retry', ['clinicLead'], 'write', ['assignedTherapist']),
}

/** What the rules below look at. */
export interface LetterStanding {
  state: LetterState
  authorId: string
  authorNewlyQualified: boolean
}

export const isAuthor = (access: ChildAccess, letter: LetterStanding) => access.viewer.id === letter.authorId

export const canStartLetter = (access: ChildAccess) => isRelation(access, 'assignedTherapist')

export const canChangeLetter = (access: ChildAccess, letter: LetterStanding) =>
  isRelation(access, 'assignedTherapist') && letter.state === 'draft'

/** Only the newly qualified hand a letter over; everybody else approves their own. */
export const canSubmitLetter = (access: ChildAccess, letter: LetterStanding) =>
  canChangeLetter(access, letter) && access.viewer.newlyQualified

/**
 * Nothing leaves without a person's approval. A letter written by a newly qualified therapist needs the lead's; every
 * other letter its author's or the lead's.
 */
export const canApproveLetter = (access: ChildAccess, letter: LetterStanding) => {
  if (isRelation(access, 'clinicLead'))
    return letter.state === 'awaiting_approval' && !isAuthor(access, letter)
  return (
    isRelation(access, 'assignedTherapist') &&
    letter.state === 'draft' &&
    !letter.authorNewlyQualified &&
    !access.viewer.newlyQualified
  )
}

export const canReturnLetter = (access: ChildAccess, letter: LetterStanding) =>
  isRelation(access, 'clinicLead') && letter.state === 'awaiting_approval'

export const canRetryDelivery = (access: ChildAccess) => isRelation(access, 'clinicLead')

export const canTakeBackLetter = (access: ChildAccess, letter: LetterStanding) =>
  isRelation(access, 'assignedTherapist') && ['awaiting_approval', 'approved'].includes(letter.state)

export const canSendLetter = (access: ChildAccess, letter: LetterStanding) =>
  isRelation(access, ...team) && ['approved', 'queued', 'sent'].includes(letter.state)

export const canRecallLetter = (access: ChildAccess, letter: LetterStanding) =>
  isRelation(access, ...team) && ['approved', 'queued'].includes(letter.state)

export const canDiscardLetter = (access: ChildAccess, letter: LetterStanding) =>
  canChangeLetter(access, letter) && isAuthor(access, letter) && isStaff(access.viewer.roles)

export type LetterRule = (access: ChildAccess, letter: LetterStanding) => boolean

/**
 * How a step that a rule does not allow is refused: 'forbidden' when the letter is still in work and it is the lead
 * who asks, for the step is then its author's; 'closed' when the letter's state stands in the way. Null: allowed.
 */
export const letterRefusal = (
  access: ChildAccess,
  letter: LetterStanding,
  may: LetterRule,
): 'forbidden' | 'closed' | null => {
  if (may(access, letter)) return null
  const inWork = ['draft', 'awaiting_approval', 'approved'].includes(letter.state)
  return inWork && isRelation(access, 'clinicLead') ? 'forbidden' : 'closed'
}

/** What decides whether and how a letter may be e-mailed to one carer. */
export interface Addressee {
  email: string | null
  restricted: boolean
  safeToContact: boolean
  hasAccount: boolean
  /** E-mail consents in force for this carer. */
  link: boolean
  attachment: boolean
}

/** How a letter reaches a carer by e-mail, or why it does not, in words. */
export const letterChannel = (
  carer: Addressee,
): { channel: 'link' | 'attachment' | null; why: string | null } => {
  if (carer.restricted) return { channel: null, why: 'This carer may not be written to' }
  if (!carer.safeToContact) return { channel: null, why: 'It is not safe to contact this carer' }
  if (carer.email === null) return { channel: null, why: 'No e-mail address: print the letter' }
  if (carer.attachment) return { channel: 'attachment', why: null }
  if (!carer.link) return { channel: null, why: 'No consent to e-mail: print the letter' }
  if (!carer.hasAccount) return { channel: null, why: 'No account yet: invite this carer first' }
  return { channel: 'link', why: null }
}
