import { systemActor } from '../access/actor.ts'
import { now } from '../clock.ts'
import { User } from '../entities/User.ts'
import { issueToken } from './accounts.ts'
import { insertAccount } from './invitations.ts'
import { transact } from './transact.ts'

export const firstAdministratorAddress = 'first.administrator@fanflower.example'

/**
 * While no account can sign in, makes a fresh one-time link for the first administrator; null once somebody can.
 * There is no default account and no default password.
 */
export const firstAdministratorLink = (appUrl: string): Promise<string | null> =>
  transact(systemActor('first-administrator'), async (tx, record) => {
    record({ action: 'first_administrator.checked' })
    const [{ usable } = { usable: '0' }] = (await tx.query(
      'SELECT COUNT(*) AS usable FROM users WHERE passwordHash IS NOT NULL',
    )) as { usable: string }[]
    if (Number(usable) > 0) return null
    await tx.query('UPDATE user_tokens SET usedAt = ? WHERE usedAt IS NULL', [now()])
    const known = await tx.findOneBy(User, { email: firstAdministratorAddress })
    const user =
      known ??
      (await insertAccount(tx, {
        email: firstAdministratorAddress,
        displayName: 'First administrator',
        roles: ['administrator'],
        newlyQualified: false,
      }))
    return `${appUrl}/invitation#${await issueToken(tx, user.id, 'invitation')}`
  })
