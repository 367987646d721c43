import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation } from './policy.ts'

const write = (name: string) => childPolicy(name, ['assignedTherapist'], 'write', ['clinicLead'])

export const measurePolicies = {
  list: childPolicy('measures.list', ['assignedTherapist', 'clinicLead'], 'read'),
  read: childPolicy('measure.read', ['assignedTherapist', 'clinicLead'], 'read'),
  start: write('measure.start'),
  change: write('measure.change'),
  discard: write('measure.discard'),
  lock: write('measure.lock'),
}

interface Measured {
  lockedAt: Date | null
  replacedById: string | null
}

export const canChangeMeasure = (access: ChildAccess, { lockedAt }: Measured) =>
  isRelation(access, 'assignedTherapist') && lockedAt === null

export const canReplaceMeasure = (access: ChildAccess, { lockedAt, replacedById }: Measured) =>
  isRelation(access, 'assignedTherapist') && lockedAt !== null && replacedById === null
