import type { Day } from '../../shared/days.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation } from './policy.ts'

const write = (name: string) => childPolicy(name, ['assignedTherapist'], 'write', ['clinicLead'])

export const goalPolicies = {
  list: childPolicy('goals.list', ['assignedTherapist', 'clinicLead'], 'read'),
  create: write('goal.create'),
  rate: write('goal.rate'),
  end: write('goal.end'),
}

export const canCreateGoal = (access: ChildAccess) => isRelation(access, 'assignedTherapist')

/** An ended goal keeps its ratings as they are. */
export const canWorkOnGoal = (access: ChildAccess, { endedOn }: { endedOn: Day | null }) =>
  isRelation(access, 'assignedTherapist') && endedOn === null
