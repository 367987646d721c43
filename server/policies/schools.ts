import { staffRoles } from '../../shared/roles.ts'
import type { Viewer } from '../access/actor.ts'
import { rolePolicy } from './policy.ts'

/** Schools and classes name no child, so reading them leaves no entry. */
export const schoolPolicies = {
  list: rolePolicy('schools.list', staffRoles, 'none'),
  classChoices: rolePolicy('classes.choices', staffRoles, 'none'),
  create: rolePolicy('schools.create', ['administrator'], 'write'),
  createClass: rolePolicy('classes.create', ['administrator'], 'write'),
  changeClass: rolePolicy('classes.change', ['administrator'], 'write'),
}

export const canChangeSchools = (viewer: Viewer) => viewer.roles.includes('administrator')
