import { createHash, randomBytes, randomUUID } from 'node:crypto'
import { firstSettings } from '../../../server/services/settings.ts'
import { now } from '../../../server/clock.ts'
import { UserToken } from '../../../server/entities/UserToken.ts'
import type { TokenPurpose } from '../../../shared/users.ts'
import { signedInAs } from '../app.ts'
import { buildClass, buildUser, testPassword } from '../factories.ts'
import { insertRow } from '../insertRow.ts'
import { versionOf, type Calls, type On } from './call.ts'

const newPassword = 'meadow-kettle-orchard-88-plume'

const twin = async ({ person }: On) => {
  const user = await buildUser('therapist', { roles: [...person.user.roles] })
  return { user, cookie: (await signedInAs(user)).cookie }
}

const token = async (purpose: TokenPurpose): Promise<string> => {
  const user = await buildUser('therapist')
  const text = randomBytes(32).toString('base64url')
  await insertRow(UserToken, {
    id: randomUUID(),
    tokenHash: createHash('sha256').update(text).digest(),
    userId: user.id,
    purpose,
    createdAt: now(),
    expiresAt: new Date(now().getTime() + 600_000),
    usedAt: null,
  })
  return text
}

const colleague = (disabledAt: Date | null = null) => buildUser('therapist', { disabledAt })

/** Signing in, one's own account, the clinic's people, places and settings. */
export const accountCalls: Calls = {
  'GET /api/health': () => ({}),
  'GET /api/session': () => ({}),
  'POST /api/sign-in': async (on) => {
    const instead = await twin(on)
    return {
      instead,
      body: { email: instead.user.email, password: testPassword, sharedComputer: false },
    }
  },
  'POST /api/sign-out': async (on) => ({ instead: await twin(on), body: {} }),
  'POST /api/password-resets': async () => ({ body: { email: (await buildUser('guardian')).email } }),
  'POST /api/password-resets/confirm': async () => ({
    body: { token: await token('password_reset'), newPassword },
  }),
  'POST /api/invitations/confirm': async () => ({ body: { token: await token('invitation'), newPassword } }),
  'PATCH /api/me': () => ({ body: { workingHand: 'left', theme: 'system' } }),
  'POST /api/me/password': async (on) => ({
    instead: await twin(on),
    body: { currentPassword: testPassword, newPassword },
  }),

  'GET /api/users': () => ({}),
  'POST /api/invitations': () => ({
    body: {
      displayName: 'A colleague',
      email: `new-${randomUUID().slice(0, 8)}@harrowmere.example`,
      roles: ['therapist'],
      newlyQualified: false,
    },
  }),
  'PATCH /api/users/:id': async () => {
    const user = await colleague()
    return { ids: [user.id], version: 1, body: { roles: ['therapist'], newlyQualified: true } }
  },
  'POST /api/users/:id/disable': async () => ({ ids: [(await colleague()).id], body: {} }),
  'POST /api/users/:id/enable': async () => ({ ids: [(await colleague(now())).id], body: {} }),

  'GET /api/schools': () => ({}),
  'GET /api/class-choices': () => ({}),
  'GET /api/therapists': () => ({}),
  'POST /api/schools': () => ({ body: { name: `School ${randomUUID()}`, town: null } }),
  'POST /api/classes': async () => {
    const { schoolId } = await buildClass()
    return { body: { schoolId, name: 'Larks', schoolYear: 2026, ages: null, teacherId: null } }
  },
  'PUT /api/classes/:id': async () => {
    const { id, schoolId } = await buildClass()
    return {
      ids: [id],
      version: await versionOf('school_classes', id),
      body: { schoolId, name: 'Robins', schoolYear: 2026, ages: null, teacherId: null },
    }
  },

  'GET /api/settings': () => ({}),
  'PUT /api/settings': async () => ({
    version: await versionOf('clinic_settings', 1),
    body: firstSettings,
  }),
}
