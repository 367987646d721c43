import type { SessionUser } from '../../shared/users.ts'
import type { User } from '../entities/User.ts'

export const presentSessionUser = (user: User): SessionUser => ({
  id: user.id,
  displayName: user.displayName,
  email: user.email,
  roles: user.roles,
  workingHand: user.workingHand,
  theme: user.theme,
  newlyQualified: user.newlyQualified,
})
