import { isStaff, roles, staffRoles, type Role } from '../../shared/roles.ts'
import type { Viewer } from '../access/actor.ts'
import { rolePolicy } from './policy.ts'

const office = ['administrator', 'clinicLead'] as const

export const userPolicies = {
  list: rolePolicy('users.list', office, 'read'),
  invite: rolePolicy('users.invite', office, 'write'),
  change: rolePolicy('users.change', ['administrator'], 'write'),
  disable: rolePolicy('users.disable', office, 'write'),
  enable: rolePolicy('users.enable', office, 'write'),
}

const isAdministrator = (viewer: Viewer) => viewer.roles.includes('administrator')

/** An administrator sees every account; a lead sees colleagues, without their sign-ins. */
export const seesEveryAccount = isAdministrator

/** Roles this viewer may look for in the list; who is a carer here is nothing a lead may find out. */
export const searchableRoles = (viewer: Viewer): readonly Role[] =>
  seesEveryAccount(viewer) ? roles : roles.filter((role) => role !== 'guardian')

/** Roles this viewer may give by invitation. A carer's account begins with their child, never here. */
export const invitableRoles = (viewer: Viewer): readonly Role[] =>
  isAdministrator(viewer) ? roles.filter((role) => role !== 'guardian') : staffRoles

interface Account {
  id: string
  roles: readonly Role[]
  disabledAt: Date | null
}

/** Nobody changes what they themselves may do. */
export const canChangeUser = (viewer: Viewer, { id }: Pick<Account, 'id'>) =>
  isAdministrator(viewer) && id !== viewer.id

const looksAfter = (viewer: Viewer, account: Account) =>
  account.id !== viewer.id && (isAdministrator(viewer) || isStaff(account.roles))

export const canDisableUser = (viewer: Viewer, account: Account) =>
  account.disabledAt === null && looksAfter(viewer, account)

export const canEnableUser = (viewer: Viewer, account: Account) =>
  account.disabledAt !== null && looksAfter(viewer, account)
