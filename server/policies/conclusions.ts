import type { ConclusionState } from '../../shared/conclusions.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation } from './policy.ts'

const read = (name: string) => childPolicy(name, ['assignedTherapist', 'clinicLead'], 'read')
const byTherapist = (name: string) => childPolicy(name, ['assignedTherapist'], 'write', ['clinicLead'])

export const conclusionPolicies = {
  list: read('conclusions.list'),
  read: read('conclusion.read'),
  check: read('conclusion.check'),
  report: read('conclusion.report'),
  start: byTherapist('conclusion.start'),
  change: byTherapist('conclusion.change'),
  discard: byTherapist('conclusion.discard'),
  sign: byTherapist('conclusion.sign'),
  countersign: childPolicy('conclusion.countersign', ['assignedTherapist', 'clinicLead'], 'write'),
}

export interface ConclusionStanding {
  state: ConclusionState
  authorId: string
}

/** Any therapist who holds the child goes on with the draft; whoever signs it is its author. */
export const canChangeConclusion = (access: ChildAccess, { state }: Pick<ConclusionStanding, 'state'>) =>
  isRelation(access, 'assignedTherapist') && state === 'draft'

/** A second, experienced person: the clinic lead or another therapist who holds the child. */
export const mayCountersignConclusion = (
  access: ChildAccess,
  { authorId }: Pick<ConclusionStanding, 'authorId'>,
) =>
  isRelation(access, 'assignedTherapist', 'clinicLead') &&
  !access.viewer.newlyQualified &&
  access.viewer.id !== authorId

export const canCountersignConclusion = (access: ChildAccess, conclusion: ConclusionStanding) =>
  conclusion.state === 'awaiting_countersignature' && mayCountersignConclusion(access, conclusion)

/** A signed one is replaced once, and only while no draft is open for the child. */
export const canReplaceConclusion = (
  access: ChildAccess,
  {
    state,
    replacedById,
    draftOpen,
  }: { state: ConclusionState; replacedById: string | null; draftOpen: boolean },
) => isRelation(access, 'assignedTherapist') && state === 'signed' && replacedById === null && !draftOpen

/** The report is printed from what was signed, never from a draft. */
export const hasReport = ({ state }: Pick<ConclusionStanding, 'state'>) => state === 'signed'
