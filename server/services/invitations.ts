import { randomUUID } from 'node:crypto'
import type { Role } from '../../shared/roles.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { User } from '../entities/User.ts'
import { carerInvitation, staffInvitation } from '../mail/mailTemplates.ts'
import { execute } from '../queries/sql.ts'
import { issueToken } from './accounts.ts'
import { enqueueMail } from './outbox.ts'

/** How long the link works, in words; services/accounts.ts holds the figure. */
const worksFor = '72 hours'

export interface NewAccount {
  id?: string
  email: string
  displayName: string
  roles: Role[]
  newlyQualified: boolean
}

/** An account without a password: nobody can sign in until its owner has chosen one through the link. */
export const insertAccount = async (tx: Tx, account: NewAccount): Promise<User> => {
  const user = tx.create(User, {
    id: randomUUID(),
    ...account,
    passwordHash: null,
    workingHand: 'left',
    theme: 'system',
    wte: null,
    disabledAt: null,
    lastSignInAt: null,
    createdAt: now(),
  })
  await tx.insert(User, user)
  return user
}

export interface Invitation {
  user: Pick<User, 'id' | 'email' | 'displayName'>
  to: 'staff' | 'carer'
  settings: ClinicSettings
  appUrl: string
  invitedById: string
}

/** Sends a fresh link, in the transaction of the act; links sent earlier stop working. */
export const sendInvitation = async (
  tx: Tx,
  { user, to, settings, appUrl, invitedById }: Invitation,
): Promise<void> => {
  await execute(
    tx,
    "UPDATE user_tokens SET usedAt = :now WHERE userId = :userId AND purpose = 'invitation' AND usedAt IS NULL",
    { now: now(), userId: user.id },
  )
  const link = `${appUrl}/invitation#${await issueToken(tx, user.id, 'invitation')}`
  const mail =
    to === 'carer'
      ? carerInvitation({ clinic: settings, link, worksFor })
      : staffInvitation({ clinic: settings, link, worksFor, name: user.displayName })
  await enqueueMail(tx, { kind: 'invitation', recipient: user.email, ...mail }, invitedById)
}
