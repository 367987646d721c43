import { rolePolicy } from './policy.ts'

export const reviewPolicies = {
  figures: rolePolicy('review.figures', ['clinicLead'], 'read'),
  list: rolePolicy('review.list', ['clinicLead'], 'read'),
}
