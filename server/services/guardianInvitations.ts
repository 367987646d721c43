import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Guardian } from '../entities/Guardian.ts'
import { User } from '../entities/User.ts'
import { conflict, invalid } from '../errors.ts'
import { findForChild } from '../queries/scope.ts'
import { selectOne } from '../queries/sql.ts'
import { guardianFact, lockGuardian } from './guardians.ts'
import { countInvitation, insertAccount, sendInvitation } from './invitations.ts'
import { readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { updateIfCurrent } from './versions.ts'

/**
 * Gives a carer an account and sends the link to choose a password. Inviting states that staff have confirmed who this
 * is and the address. Somebody who signs in already, with another child or as staff, gets the child added and no link.
 */
export const inviteGuardian = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  appUrl: string,
): Promise<void> => {
  const { email } = await findForChild(access, Guardian, id)
  if (email === null) throw invalid({ email: 'Enter an e-mail address for this carer first' })
  await countInvitation(email)
  const settings = await readSettings()
  await transact(actor, async (tx, record) => {
    const guardian = await lockGuardian(tx, access, id)
    assertInvitable(guardian)
    if (guardian.email !== email)
      throw invalid({ email: 'The address has just been changed: look at it again' })
    const user = await accountFor(tx, guardian, email)
    await updateIfCurrent(tx, Guardian, id, guardian.version, { userId: user.id, verifiedAt: now() })
    if (await hasNoPassword(tx, user.id))
      await sendInvitation(tx, { user, to: 'carer', settings, appUrl, invitedById: access.viewer.id })
    record(guardianFact(access, 'guardian.invited', id))
  })
}

const assertInvitable = ({ restricted, safeToContact }: Guardian) => {
  if (restricted) throw conflict('closed', 'This carer is restricted and cannot be invited.')
  if (!safeToContact) throw invalid({ email: 'It is marked as not safe to contact this carer' })
}

const hasNoPassword = async (tx: Tx, userId: string): Promise<boolean> =>
  (await selectOne('SELECT id FROM users WHERE id = :userId AND passwordHash IS NULL', { userId }, tx)) !==
  null

/** The account of this address: one that exists, with the carer's role added, or a new one. */
const accountFor = async (tx: Tx, guardian: Guardian, email: string): Promise<User> => {
  const known = await tx
    .createQueryBuilder(User, 'u')
    .where('u.email = :email', { email })
    .setLock('pessimistic_write')
    .getOne()
  if (!known)
    return insertAccount(tx, {
      email,
      displayName: guardian.name,
      roles: ['guardian'],
      newlyQualified: false,
    })
  if (known.disabledAt)
    throw invalid({ email: 'The account of this address is closed: ask an administrator' })
  if (guardian.userId === known.id && !(await hasNoPassword(tx, known.id)))
    throw conflict('closed', 'This carer signs in already.')
  const other = await selectOne(
    `SELECT g.id FROM guardians g WHERE g.childId = :childId AND g.id <> :id AND g.userId = :userId AND g.endedAt IS NULL
     LIMIT 1`,
    { childId: guardian.childId, id: guardian.id, userId: known.id },
    tx,
  )
  if (other)
    throw invalid({
      email:
        'Another carer of this child signs in with this address: each adult needs an address of their own',
    })
  if (!known.roles.includes('guardian'))
    await tx.update(User, { id: known.id }, { roles: [...known.roles, 'guardian'] })
  return known
}
