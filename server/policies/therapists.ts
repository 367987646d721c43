import { staffRoles } from '../../shared/roles.ts'
import { rolePolicy } from './policy.ts'

export const therapistPolicies = {
  list: rolePolicy('therapists.list', staffRoles, 'none'),
}
