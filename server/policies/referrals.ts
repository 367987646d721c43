import { staffRoles } from '../../shared/roles.ts'
import type { ReferralStatus } from '../../shared/referrals.ts'
import type { Viewer } from '../access/actor.ts'
import { rolePolicy } from './policy.ts'

const officeRoles = ['administrator', 'clinicLead'] as const

export const referralPolicies = {
  list: rolePolicy('referrals.list', staffRoles, 'read'),
  read: rolePolicy('referrals.read', staffRoles, 'read'),
  duplicates: rolePolicy('referrals.duplicates', officeRoles, 'read'),
  enter: rolePolicy('referrals.enter', officeRoles, 'write'),
  change: rolePolicy('referrals.change', officeRoles, 'write'),
  accept: rolePolicy('referrals.accept', ['therapist', 'clinicLead'], 'write'),
  decline: rolePolicy('referrals.decline', ['clinicLead'], 'write'),
}

interface DecidableReferral {
  status: ReferralStatus
  /** A child of the same name and birth date is on the register. */
  childKnown: boolean
}

export const isUndecided = (status: ReferralStatus) => status === 'new' || status === 'incomplete'

/** Lead and administrators see every referral with names; a therapist sees the queue without. */
export const seesEveryReferral = (viewer: Viewer) => officeRoles.some((role) => viewer.roles.includes(role))

export const isLead = (viewer: Viewer) => viewer.roles.includes('clinicLead')

export const canChangeReferral = (viewer: Viewer, { status }: DecidableReferral) =>
  seesEveryReferral(viewer) && isUndecided(status)

/** An incomplete referral can only be joined to a child who is known already. */
export const canAcceptReferral = (viewer: Viewer, { status, childKnown }: DecidableReferral) =>
  (isLead(viewer) || viewer.roles.includes('therapist')) &&
  (status === 'new' || (status === 'incomplete' && childKnown))

export const canDeclineReferral = (viewer: Viewer, { status }: DecidableReferral) =>
  isLead(viewer) && isUndecided(status)

/** Whose case it may become: anybody's for a lead, the therapist's own otherwise. */
export const canAllocateTo = (viewer: Viewer, therapistId: string) =>
  isLead(viewer) || (viewer.roles.includes('therapist') && therapistId === viewer.id)
