import { setTimeout as pause } from 'node:timers/promises'
import { createHash, randomBytes, randomUUID } from 'node:crypto'
import type { TokenPurpose } from '../../shared/users.ts'
import { actorFor, systemActor, type Actor, type Viewer } from '../access/actor.ts'
import { now } from '../clock.ts'
import { database, type Tx } from '../dataSource.ts'
import { User } from '../entities/User.ts'
import { UserToken } from '../entities/UserToken.ts'
import { AppError, gone } from '../errors.ts'
import { passwordChanged, passwordReset } from '../mail/mailTemplates.ts'
import { formatMoment } from '../../shared/days.ts'
import { execute } from '../queries/sql.ts'
import { recordAudit } from './audit.ts'
import { enqueueMail } from './outbox.ts'
import { assertStrongPassword, hashPassword, needsRehash, verifyPassword } from './passwords.ts'
import { endSessionsOf } from './sessions.ts'
import { readSettings } from './settings.ts'
import { clearAttempts, countAttempt, countHit, forgiveHit } from './throttles.ts'
import { transact } from './transact.ts'

const resetMinutes = 30
/** How long the link of an invitation works. */
export const invitationHours = 72

export const hashToken = (token: string) => createHash('sha256').update(token).digest()
export const newToken = () => randomBytes(32).toString('base64url')

const viewerOf = ({ id, displayName, roles, newlyQualified }: User): Viewer => ({
  id,
  displayName,
  roles,
  newlyQualified,
})

/** The person as requests know them; null for an unknown or disabled account. */
export const findViewer = async (userId: string): Promise<(Viewer & { user: User }) | null> => {
  const user = await database().manager.findOneBy(User, { id: userId })
  return !user || user.disabledAt ? null : { ...viewerOf(user), user }
}

export interface SignInAttempt {
  email: string
  password: string
  address: string
  /** Token of the browser's device cookie, when it has one. */
  device: string | null
  requestId: string
}

/**
 * Checks an address and password. Unknown address, wrong password and disabled account answer alike (null) after the
 * same work. A browser known for this account has a count of its own, so strangers' guesses cannot lock its owner out.
 */
export const checkSignIn = async ({
  email,
  password,
  address,
  device,
  requestId,
}: SignInAttempt): Promise<User | null> => {
  const user = await database()
    .manager.createQueryBuilder(User, 'u')
    .addSelect('u.passwordHash')
    .where('u.email = :email', { email })
    .getOne()
  const known = user && device ? await isKnownDevice(user.id, device) : false
  const key = known ? `device:${device}` : `account:${email.toLowerCase()}`
  await countHit(`address:${address}`, 30, 60)
  await countAttempt(key)
  const matches = await verifyPassword(user?.passwordHash ?? null, password)
  if (!user || !matches || user.disabledAt) {
    await recordAudit(
      { ...systemActor(requestId) },
      { action: 'sign_in.refused', objectType: 'user', objectId: user?.id, result: 'denied' },
    )
    return null
  }
  await clearAttempts(key)
  await forgiveHit(`address:${address}`)
  // In plain SQL, here and below: TypeORM would raise the version, as if somebody had changed the account.
  if (user.passwordHash && needsRehash(user.passwordHash))
    await database().query('UPDATE users SET passwordHash = ? WHERE id = ?', [
      await hashPassword(password),
      user.id,
    ])
  return user
}

const isKnownDevice = async (userId: string, device: string): Promise<boolean> => {
  const [row] = (await database().query('SELECT id FROM known_devices WHERE tokenHash = ? AND userId = ?', [
    hashToken(device),
    userId,
  ])) as { id: string }[]
  return row !== undefined
}

/** Notes the sign-in and makes this browser a known one. The account's version stays: nobody's open form gets stale. */
export const noteSignIn = async (user: User, requestId: string, device: string): Promise<void> => {
  await transact(actorFor(viewerOf(user), requestId), async (tx, record) => {
    await execute(tx, 'UPDATE users SET lastSignInAt = :now WHERE id = :id', { now: now(), id: user.id })
    await tx.query(
      `INSERT INTO known_devices (id, tokenHash, userId, createdAt, lastUsedAt) VALUES (?, ?, ?, ?, ?)
       ON DUPLICATE KEY UPDATE lastUsedAt = VALUES(lastUsedAt)`,
      [randomUUID(), hashToken(device), user.id, now(), now()],
    )
    record({ action: 'sign_in.done', objectType: 'user', objectId: user.id })
  })
}

/** Makes a single-use link token; the caller's e-mail carries it, the database only its hash. */
export const issueToken = async (tx: Tx, userId: string, purpose: TokenPurpose): Promise<string> => {
  const token = newToken()
  const minutes = purpose === 'invitation' ? invitationHours * 60 : resetMinutes
  await tx.insert(UserToken, {
    id: randomUUID(),
    tokenHash: hashToken(token),
    userId,
    purpose,
    createdAt: now(),
    expiresAt: new Date(now().getTime() + minutes * 60_000),
    usedAt: null,
  })
  return token
}

/** Links sent earlier stop working; all of them, or those for one purpose. */
export const spendTokens = async (
  tx: Tx,
  userId: string,
  purpose: TokenPurpose | null = null,
): Promise<void> => {
  await execute(
    tx,
    `UPDATE user_tokens SET usedAt = :now
     WHERE userId = :userId AND usedAt IS NULL AND (:purpose IS NULL OR purpose = :purpose)`,
    { now: now(), userId, purpose },
  )
}

/** Longer than the work below ever takes on a healthy machine, so that the time of the answer tells nothing. */
const resetAnswerMs = 250

/**
 * Sends a reset link when the address has an active account. The answer is the same either way, and so is the time it
 * takes: writing a link and its e-mail would otherwise show who has an account.
 */
export const requestPasswordReset = async (
  email: string,
  address: string,
  requestId: string,
  appUrl: string,
): Promise<void> => {
  await countHit(`reset:${email.toLowerCase()}`, 3, 3600)
  await countHit(`reset-address:${address}`, 20, 3600)
  await Promise.all([sendResetLink(email, requestId, appUrl), pause(resetAnswerMs)])
}

const sendResetLink = async (email: string, requestId: string, appUrl: string): Promise<void> => {
  const user = await database().manager.findOneBy(User, { email })
  const settings = await readSettings()
  await transact(systemActor(requestId), async (tx, record) => {
    record({ action: 'password_reset.requested', objectType: 'user', objectId: user?.id })
    if (!user || user.disabledAt) return
    const token = await issueToken(tx, user.id, 'password_reset')
    const link = `${appUrl}/reset-password#${token}`
    const mail = passwordReset({ clinic: settings, link, worksFor: `${resetMinutes} minutes` })
    await enqueueMail(tx, { kind: 'password_reset', recipient: user.email, ...mail }, null)
  })
}

/**
 * Sets a password through an invitation or reset link. The link works once and only for its purpose; anything else
 * answers 410. All sign-ins of the person end; nobody is signed in by a link.
 */
export const useToken = async (
  token: string,
  purpose: TokenPurpose,
  password: string,
  address: string,
  requestId: string,
): Promise<void> => {
  await countHit(`token:${address}`, 30, 60)
  const spent = () => gone('link_used', 'This link has been used or is too old. Ask for a new one.')
  const found = await database()
    .manager.createQueryBuilder(UserToken, 't')
    .innerJoinAndSelect('t.user', 'u')
    .where('t.tokenHash = :hash AND t.purpose = :purpose', { hash: hashToken(token), purpose })
    .getOne()
  if (!found || found.usedAt || found.expiresAt <= now() || found.user.disabledAt) throw spent()
  const settings = await readSettings()
  assertStrongPassword(password, [found.user.displayName, found.user.email, settings.clinicName])
  const passwordHash = await hashPassword(password)
  await transact(systemActor(requestId), async (tx, record) => {
    const used = (await tx.query(
      'UPDATE user_tokens SET usedAt = ? WHERE id = ? AND usedAt IS NULL AND expiresAt > ?',
      [now(), found.id, now()],
    )) as { affectedRows: number }
    if (used.affectedRows !== 1) throw spent()
    await setPassword(tx, found.userId, passwordHash)
    record({ action: `${purpose}.used`, objectType: 'user', objectId: found.userId })
  })
  await clearAttempts(`account:${found.user.email.toLowerCase()}`)
}

const setPassword = async (tx: Tx, userId: string, passwordHash: string) => {
  await tx.update(User, { id: userId }, { passwordHash })
  await spendTokens(tx, userId)
  await endSessionsOf(tx, userId)
}

const wrongPassword = () =>
  new AppError(403, 'wrong_password', 'The current password is not right.', {
    fields: { currentPassword: 'The current password is not right' },
  })

/** Changes the own password; every other sign-in ends and a notice goes out. `keep` is the hash of the current session. */
export const changePassword = async (
  actor: Actor,
  viewer: Viewer,
  current: string,
  next: string,
  keep: Buffer,
): Promise<void> => {
  const user = await database()
    .manager.createQueryBuilder(User, 'u')
    .addSelect('u.passwordHash')
    .where('u.id = :id', { id: viewer.id })
    .getOneOrFail()
  await countAttempt(`password:${user.id}`)
  if (!(await verifyPassword(user.passwordHash, current))) throw wrongPassword()
  await clearAttempts(`password:${user.id}`)
  const settings = await readSettings()
  assertStrongPassword(next, [user.displayName, user.email, settings.clinicName])
  const passwordHash = await hashPassword(next)
  await transact(actor, async (tx, record) => {
    await tx.update(User, { id: user.id }, { passwordHash })
    await endSessionsOf(tx, user.id, keep)
    const notice = passwordChanged({
      clinic: settings,
      changedAt: formatMoment(now().toISOString(), settings.timeZone),
    })
    await enqueueMail(tx, { kind: 'password_changed', recipient: user.email, ...notice }, user.id)
    record({ action: 'password.changed', objectType: 'user', objectId: user.id })
  })
}
