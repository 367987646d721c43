import type { SessionUser, UserRow } from '../../shared/users.ts'
import type { Viewer } from '../access/actor.ts'
import type { User } from '../entities/User.ts'
import { canChangeUser, canDisableUser, canEnableUser, seesEveryAccount } from '../policies/users.ts'
import type { AccountRow } from '../queries/users.ts'

export const presentSessionUser = (user: User): SessionUser => ({
  id: user.id,
  displayName: user.displayName,
  email: user.email,
  roles: user.roles,
  workingHand: user.workingHand,
  theme: user.theme,
  newlyQualified: user.newlyQualified,
})

const stateOf = ({ disabledAt, hasPassword }: AccountRow): UserRow['state'] => {
  if (disabledAt !== null) return 'disabled'
  return hasPassword ? 'active' : 'invited'
}

export const presentUser = (row: AccountRow, viewer: Viewer): UserRow => ({
  id: row.id,
  displayName: row.displayName,
  email: row.email,
  // That a colleague's own child is seen here is not for the lead to read off a list.
  roles: seesEveryAccount(viewer) ? row.roles : row.roles.filter((role) => role !== 'guardian'),
  newlyQualified: row.newlyQualified,
  state: stateOf(row),
  lastSignInAt: seesEveryAccount(viewer) ? (row.lastSignInAt?.toISOString() ?? null) : null,
  version: row.version,
  can: {
    change: canChangeUser(viewer, row),
    disable: canDisableUser(viewer, row),
    enable: canEnableUser(viewer, row),
  },
})
