import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation } from './policy.ts'

export const schoolAdvicePolicies = {
  read: childPolicy('schoolAdvice.read', ['assignedTherapist', 'clinicLead'], 'read'),
  publish: childPolicy('schoolAdvice.publish', ['assignedTherapist'], 'write', ['clinicLead']),
  end: childPolicy('schoolAdvice.end', ['assignedTherapist'], 'write', ['clinicLead']),
}

interface Advice {
  endedAt: Date | null
}

export const canPublishAdvice = (access: ChildAccess, shared: boolean): boolean =>
  isRelation(access, 'assignedTherapist') && shared

export const canEndAdvice = (access: ChildAccess, { endedAt }: Advice): boolean =>
  isRelation(access, 'assignedTherapist') && endedAt === null

/** The teacher answers what is in force; a therapist reads the answer. */
export const canReplyToAdvice = (access: ChildAccess, { endedAt }: Advice): boolean =>
  isRelation(access, 'teacher') && endedAt === null
