import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation } from './policy.ts'

const read = (name: string) => childPolicy(name, ['assignedTherapist', 'clinicLead'], 'read')
const write = (name: string) => childPolicy(name, ['assignedTherapist'], 'write', ['clinicLead'])

export const samplePolicies = {
  list: read('samples.list'),
  file: read('sample.file'),
  thumbnail: read('sample.thumbnail'),
  add: write('sample.add'),
  remove: write('sample.remove'),
}

export const canAddSample = (access: ChildAccess, consented: boolean) =>
  isRelation(access, 'assignedTherapist') && consented

export const canRemoveSample = (access: ChildAccess) => isRelation(access, 'assignedTherapist')
