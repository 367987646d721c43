import type { ChildRelation } from '../../shared/roles.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation } from './policy.ts'

const staff: readonly ChildRelation[] = ['assignedTherapist', 'clinicLead', 'administrator']
const write = (name: string) => childPolicy(name, staff, 'write', ['guardian'])

export const guardianPolicies = {
  /** For the clinic. A carer meets their own contact on their own page, without what the clinic notes about them. */
  list: childPolicy('guardians.list', staff, 'read', ['guardian']),
  add: write('guardian.add'),
  change: write('guardian.change'),
  invite: write('guardian.invite'),
  restrict: write('guardian.restrict'),
}

export const canChangeGuardian = (access: ChildAccess) => isRelation(access, ...staff)

interface InvitableGuardian {
  email: string | null
  safeToContact: boolean
  restricted: boolean
  account: 'none' | 'invited' | 'active' | 'disabled'
}

/** By e-mail, so only where there is an address and writing is safe; again as long as no password was chosen. */
export const canInviteGuardian = (access: ChildAccess, guardian: InvitableGuardian) =>
  canChangeGuardian(access) &&
  guardian.email !== null &&
  guardian.safeToContact &&
  !guardian.restricted &&
  (guardian.account === 'none' || guardian.account === 'invited')

/** Whoever learns of a danger can close the door at once; only the lead opens it again. */
export const canRestrictGuardian = (access: ChildAccess, { restricted }: { restricted: boolean }) =>
  restricted ? isRelation(access, 'clinicLead') : canChangeGuardian(access)
