import type { GuardianView } from '../../shared/guardians.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { canChangeGuardian, canInviteGuardian, canRestrictGuardian } from '../policies/guardians.ts'
import type { GuardianRow } from '../queries/guardians.ts'

export const presentGuardian = (row: GuardianRow, access: ChildAccess): GuardianView => ({
  id: row.id,
  name: row.name,
  relation: row.relation,
  parentalResponsibility: row.parentalResponsibility,
  courtOrder: row.courtOrder,
  safeToContact: row.safeToContact,
  email: row.email,
  phone: row.phone,
  address: row.address,
  account: row.account,
  restricted: row.restricted,
  emailConsent: row.emailConsent,
  version: row.version,
  can: {
    change: canChangeGuardian(access),
    invite: canInviteGuardian(access, row),
    restrict: canRestrictGuardian(access, row),
  },
})
