import { childPolicy } from './policy.ts'

export const handProfilePolicies = {
  read: childPolicy('handProfile.read', ['assignedTherapist', 'clinicLead'], 'read'),
}
