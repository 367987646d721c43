import { roles } from '../../shared/roles.ts'
import { openPolicy, rolePolicy } from './policy.ts'

export const sessionPolicies = {
  health: openPolicy('health.read', 'says only whether the database answers'),
  read: openPolicy('session.read', 'tells a visitor whether they are signed in'),
  signIn: openPolicy('session.signIn', 'the way in'),
  signOut: openPolicy('session.signOut', 'the way out must always work'),
  requestReset: openPolicy('passwordReset.request', 'for people who cannot sign in'),
  useToken: openPolicy('token.use', 'the token itself is the proof'),
  changeProfile: rolePolicy('profile.change', roles, 'write'),
  changePassword: rolePolicy('password.change', roles, 'write'),
}
