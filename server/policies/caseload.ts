import type { Viewer } from '../access/actor.ts'
import { rolePolicy } from './policy.ts'

export const caseloadPolicies = {
  list: rolePolicy('caseload.list', ['therapist', 'clinicLead'], 'read'),
}

/** The lead's list is the clinic's; a therapist's own holds the children allocated to them now. */
export const seesWholeClinic = (viewer: Viewer) => viewer.roles.includes('clinicLead')
