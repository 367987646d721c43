import type { ChildAccess } from '../access/childAccess.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import { childPolicy, isRelation } from './policy.ts'

const clinicians: readonly ChildRelation[] = ['assignedTherapist', 'clinicLead']
const notClinicians: readonly ChildRelation[] = ['administrator', 'guardian', 'teacher']

export const alertPolicies = {
  list: childPolicy('alerts.list', clinicians, 'read', notClinicians),
  raise: childPolicy('alert.raise', clinicians, 'write', notClinicians),
  act: childPolicy('alert.act', clinicians, 'write', notClinicians),
}

export const canActOnAlert = (access: ChildAccess, { actedAt }: { actedAt: Date | null }) =>
  isRelation(access, ...clinicians) && actedAt === null
