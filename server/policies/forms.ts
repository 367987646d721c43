import { rolePolicy } from './policy.ts'

export const formPolicies = {
  list: rolePolicy('forms.list', ['therapist', 'clinicLead', 'administrator'], 'none'),
  makeEdition: rolePolicy('form.make_edition', ['clinicLead'], 'write'),
  retire: rolePolicy('form.retire', ['clinicLead'], 'write'),
  restore: rolePolicy('form.restore', ['clinicLead'], 'write'),
}
