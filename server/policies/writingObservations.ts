import { childPolicy } from './policy.ts'

export const writingObservationPolicies = {
  list: childPolicy('writingObservations.list', ['assignedTherapist', 'clinicLead'], 'read'),
  add: childPolicy('writingObservation.add', ['assignedTherapist'], 'write', ['clinicLead']),
}
