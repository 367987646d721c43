import { staffRoles } from '../../shared/roles.ts'
import type { Viewer } from '../access/actor.ts'
import { rolePolicy } from './policy.ts'

export const therapistPolicies = {
  list: rolePolicy('therapists.list', staffRoles, 'none'),
}

/** A child who joins a colleague's cases must not show in any answer to a therapist. */
export const seesOpenCases = (viewer: Viewer) =>
  viewer.roles.includes('clinicLead') || viewer.roles.includes('administrator')
