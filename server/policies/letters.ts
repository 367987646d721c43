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
  send: childPolicy('letters.send', team, 'write'),
  retry: childPolicy('letters.retry', team, 'write'),
}

/** What the rules below look at. */
export interface LetterStanding {
  state: LetterState
  authorId: string
  authorNewlyQualified: boolean
}

export const isAuthor = (access: ChildAccess, letter: LetterStanding) => access.viewer.id === letter.authorId

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

export const canTakeBackLetter = (access: ChildAccess, letter: LetterStanding) =>
  isRelation(access, 'assignedTherapist') && ['awaiting_approval', 'approved'].includes(letter.state)

export const canSendLetter = (access: ChildAccess, letter: LetterStanding) =>
  isRelation(access, ...team) && ['approved', 'queued', 'sent'].includes(letter.state)

export const canRecallLetter = (access: ChildAccess, letter: LetterStanding) =>
  isRelation(access, ...team) && ['approved', 'queued'].includes(letter.state)

export const canDiscardLetter = (access: ChildAccess, letter: LetterStanding) =>
  canChangeLetter(access, letter) && isAuthor(access, letter) && isStaff(access.viewer.roles)
