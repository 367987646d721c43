import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation } from './policy.ts'

export const auditEntryPolicies = {
  ofChild: childPolicy('accessHistory.read', ['assignedTherapist', 'clinicLead', 'guardian'], 'read', [
    'administrator',
  ]),
}

/** A carer learns as whom, when and whether somebody read or wrote; staff learn who did what. */
export const seesWhoDidWhat = (access: ChildAccess) => isRelation(access, 'assignedTherapist', 'clinicLead')
