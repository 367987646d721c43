import { staffRoles } from '../../shared/roles.ts'
import { rolePolicy } from './policy.ts'

export const todayPolicies = {
  read: rolePolicy('today.read', staffRoles, 'read'),
}
