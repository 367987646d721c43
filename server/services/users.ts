import type { Role } from '../../shared/roles.ts'
import type { StaffInvitation, UserChange } from '../../shared/users.ts'
import type { Actor, Viewer } from '../access/actor.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { User } from '../entities/User.ts'
import { conflict, forbidden, invalid, notFound } from '../errors.ts'
import { canChangeUser, canDisableUser, canEnableUser, invitableRoles } from '../policies/users.ts'
import { countOpenCases, findUser, type AccountRow } from '../queries/users.ts'
import { spendTokens } from './accounts.ts'
import { createOnce } from './once.ts'
import { countInvitation, insertAccount, sendInvitation } from './invitations.ts'
import { endSessionsOf } from './sessions.ts'
import { clinicToday, readSettings } from './settings.ts'
import { addTask } from './tasks.ts'
import { transact } from './transact.ts'
import { unlessTaken } from './uniqueness.ts'
import { StaleWrite, updateIfCurrent } from './versions.ts'

/** Makes an account for a colleague or teacher and sends the link to choose a password. Answers the account's id. */
export const inviteUser = async (
  actor: Actor,
  viewer: Viewer,
  { displayName, email, roles, newlyQualified }: StaffInvitation,
  { key, appUrl }: { key: string | null; appUrl: string },
): Promise<string> => {
  const refused = roles.find((role) => !invitableRoles(viewer).includes(role))
  if (refused === 'guardian')
    throw invalid({
      roles: 'A carer is invited from the child’s family page, so that the two belong together',
    })
  if (refused) throw invalid({ roles: 'Only an administrator can invite a teacher' })
  await countInvitation(email)
  const settings = await readSettings()
  return transact(actor, (tx, record) =>
    createOnce(
      tx,
      actor,
      record,
      { key, request: ['user', displayName, email, roles, newlyQualified] },
      (id) => ({ action: 'user.created', objectType: 'user', objectId: id }),
      async (id) => {
        const account = { id, email, displayName, roles: [...new Set(roles)], newlyQualified }
        const user = await unlessTaken(insertAccount(tx, account), {
          email:
            'There is an account with this address already. If its link has run out, “Forgotten password” sends a new one.',
        })
        await sendInvitation(tx, { user, to: 'staff', settings, appUrl, invitedById: viewer.id })
      },
    ),
  )
}

const findOr404 = async (viewer: Viewer, id: string, tx?: Tx): Promise<AccountRow> => {
  const account = await findUser(viewer, id, tx)
  if (!account) throw notFound()
  return account
}

const has = (account: { roles: readonly Role[] }, role: Role) => account.roles.includes(role)

/** Changes what a person may do; they sign in anew. Nobody changes their own roles. Throws StaleWrite. */
export const changeUser = (
  actor: Actor,
  viewer: Viewer,
  id: string,
  version: number,
  change: UserChange,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const account = await findOr404(viewer, id, tx)
    if (!canChangeUser(viewer, account)) throw forbidden('Nobody changes their own roles.')
    if (account.version !== version) throw new StaleWrite()
    if (has(change, 'guardian') !== has(account, 'guardian'))
      throw invalid({ roles: 'Whether somebody is a carer is decided on the child’s family page' })
    if (has(account, 'therapist') && !has(change, 'therapist')) {
      const cases = await countOpenCases(tx, id)
      if (cases > 0)
        throw invalid({
          roles: `This person holds ${cases === 1 ? 'an open case' : `${cases} open cases`}: allocate to a colleague first`,
        })
    }
    const roles = [...new Set(change.roles)]
    await updateIfCurrent(tx, User, id, version, { roles, newlyQualified: change.newlyQualified })
    if (roles.toSorted().join() !== account.roles.toSorted().join()) await endSessionsOf(tx, id)
    record({
      action: 'user.roles_changed',
      objectType: 'user',
      objectId: id,
      detail: { from: account.roles, to: roles },
    })
  })

/** Closes an account: sign-ins end with the next request, links stop working, and the lead hears of open cases. */
export const disableUser = async (actor: Actor, viewer: Viewer, id: string): Promise<void> => {
  const today = clinicToday(await readSettings())
  await transact(actor, async (tx, record) => {
    const account = await findOr404(viewer, id, tx)
    if (account.disabledAt) throw conflict('closed', 'This account is closed already.')
    if (!canDisableUser(viewer, account)) throw forbidden('You cannot close this account.')
    await tx.update(User, { id }, { disabledAt: now() })
    await endSessionsOf(tx, id)
    await spendTokens(tx, id)
    if ((await countOpenCases(tx, id)) > 0)
      await addTask(tx, {
        childId: null,
        kind: 'cases_without_therapist',
        text: `The account of ${account.displayName} was closed: allocate the open cases to colleagues`,
        dueOn: today,
        assigneeId: null,
        otherwise: 'clinicLead',
      })
    record({ action: 'user.disabled', objectType: 'user', objectId: id })
  })
}

export const enableUser = (actor: Actor, viewer: Viewer, id: string): Promise<void> =>
  transact(actor, async (tx, record) => {
    const account = await findOr404(viewer, id, tx)
    if (!account.disabledAt) throw conflict('closed', 'This account is open already.')
    if (!canEnableUser(viewer, account)) throw forbidden('You cannot open this account.')
    await tx.update(User, { id }, { disabledAt: null })
    record({ action: 'user.enabled', objectType: 'user', objectId: id })
  })
