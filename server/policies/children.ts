import type { RecordSection } from '../../shared/children.ts'
import { recordSections } from '../../shared/children.ts'
import { nextStates, type EpisodeState } from '../../shared/episodes.ts'
import { staffRoles, type ChildRelation } from '../../shared/roles.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation, rolePolicy } from './policy.ts'

const clinicians: readonly ChildRelation[] = ['assignedTherapist', 'clinicLead']
const staff: readonly ChildRelation[] = [...clinicians, 'administrator']
/** They know the child and have pages of their own for it. */
const family: readonly ChildRelation[] = ['guardian', 'teacher']
const notClinicians: readonly ChildRelation[] = ['administrator', ...family]

export const childPolicies = {
  find: rolePolicy('children.find', staffRoles, 'read'),
  register: rolePolicy('children.register', ['administrator'], 'read'),
  header: childPolicy('child.header', staff, 'read', family),
  glance: childPolicy('child.glance', clinicians, 'read', notClinicians),
  identity: childPolicy('child.identity', staff, 'read', family),
  changeIdentity: childPolicy('child.changeIdentity', staff, 'write', family),
  changeCare: childPolicy('child.changeCare', clinicians, 'write', notClinicians),
  changeState: childPolicy('child.changeState', clinicians, 'write', notClinicians),
  /** Staff and family see who the therapist is; who holds a case is nothing of the school's. */
  allocate: childPolicy('child.allocate', ['clinicLead'], 'write', [
    'assignedTherapist',
    'administrator',
    'guardian',
  ]),
}

/** Sections of the record that this relation may open; an administrator sees family and consents, nothing clinical. */
export const sectionsFor = (relation: ChildRelation): RecordSection[] => {
  if (clinicians.includes(relation)) return [...recordSections]
  return relation === 'administrator' ? ['family'] : []
}

export const seesClinicalFields = (access: ChildAccess) => isRelation(access, ...clinicians)

export const canChangeIdentity = (access: ChildAccess) => isRelation(access, ...staff)

/** Whether a young person decides for themselves is a clinical judgement, not an office one. */
export const canJudgeCompetence = (access: ChildAccess) => isRelation(access, ...clinicians)

export const canAllocate = (access: ChildAccess, state: EpisodeState | null) =>
  isRelation(access, 'clinicLead') && state !== null && nextStates(state).length > 0

/** States this viewer may move the episode to. That the clinic declines a child is the lead's decision. */
export const stateChoices = (access: ChildAccess, from: EpisodeState | null): EpisodeState[] => {
  if (from === null || !isRelation(access, ...clinicians)) return []
  return nextStates(from).filter((to) => to !== 'declined' || isRelation(access, 'clinicLead'))
}
