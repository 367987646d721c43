import type { ChildRelation } from '../../shared/roles.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation } from './policy.ts'

const clinicians: readonly ChildRelation[] = ['assignedTherapist', 'clinicLead']
/** Families and teachers have pages of their own for what they agreed to or may see. */
const elsewhere: readonly ChildRelation[] = ['guardian', 'teacher']

export const consentPolicies = {
  list: childPolicy('consents.list', [...clinicians, 'administrator'], 'read', elsewhere),
  record: childPolicy('consent.record', clinicians, 'write', ['administrator', ...elsewhere]),
  withdraw: childPolicy('consent.withdraw', clinicians, 'write', ['administrator', ...elsewhere]),
}

export const canRecordWithdrawal = (access: ChildAccess, { inForce }: { inForce: boolean }) =>
  inForce && isRelation(access, ...clinicians)
