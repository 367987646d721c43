import { randomUUID } from 'node:crypto'
import type { Role } from '../../shared/roles.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { User } from '../entities/User.ts'
import { carerInvitation, staffInvitation } from '../mail/mailTemplates.ts'
import { invitationHours, issueToken, spendTokens } from './accounts.ts'
import { enqueueMail } from './outbox.ts'
import { countHit } from './throttles.ts'

const worksFor = `${invitationHours} hours`
const invitationsAnHour = 3

/** Counts an invitation to this address; too many in an hour are refused (429). */
export const countInvitation = (email: string): Promise<void> =>
  countHit(`invite:${email.toLowerCase()}`, invitationsAnHour, 3600)

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
  await spendTokens(tx, user.id, 'invitation')
  const link = `${appUrl}/invitation#${await issueToken(tx, user.id, 'invitation')}`
  const mail =
    to === 'carer'
      ? carerInvitation({ clinic: settings, link, worksFor })
      : staffInvitation({ clinic: settings, link, worksFor, name: user.displayName })
  await enqueueMail(tx, { kind: 'invitation', recipient: user.email, ...mail }, invitedById)
}
