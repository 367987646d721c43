import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { issueToken } from '../../server/services/accounts.ts'
import { hashPassword, verifyPassword, weakness } from '../../server/services/passwords.ts'
import { client, signedInAs, startApp, stopApp } from '../support/app.ts'
import { buildUser, testPassword } from '../support/factories.ts'
import { dictionary } from '@zxcvbn-ts/language-common'

beforeAll(startApp)
afterAll(stopApp)
afterEach(() => setClock(() => new Date()))

const goodPassword = 'kestrel marmalade viaduct'
const linkFor = (userId: string, purpose: 'invitation' | 'password_reset') =>
  database().transaction((tx) => issueToken(tx, userId, purpose))
const confirm = (path: string, token: unknown, newPassword = goodPassword) =>
  client().post(`/api/${path}/confirm`).send({ token, newPassword })
const signIn = (email: string, password: string) =>
  client().post('/api/sign-in').send({ email, password, sharedComputer: false })

describe('a link to choose a password', () => {
  it('works once, ends other sign-ins, and signs nobody in by itself', async () => {
    const user = await buildUser('guardian')
    const before = await signedInAs(user)
    const token = await linkFor(user.id, 'password_reset')
    const response = await confirm('password-resets', token)
    expect(response.status).toBe(204)
    expect(response.headers['set-cookie']).toBeUndefined()
    expect((await before.get('/api/session')).body.user).toBeNull()
    expect((await signIn(user.email, goodPassword)).status).toBe(200)
    expect((await confirm('password-resets', token)).status).toBe(410)
  })

  it('has exactly one winner among 20 tries at once', async () => {
    const user = await buildUser('guardian')
    const token = await linkFor(user.id, 'invitation')
    const answers = await Promise.all(Array.from({ length: 20 }, () => confirm('invitations', token)))
    const statuses = answers.map((answer) => answer.status)
    expect(statuses.filter((status) => status === 204)).toHaveLength(1)
    expect(statuses.filter((status) => status === 410)).toHaveLength(19)
  }, 30_000)

  it.each([
    ['for another purpose', 'invitation', 'password-resets', 0],
    ['31 minutes old (reset)', 'password_reset', 'password-resets', 31 * 60],
    ['73 hours old (invitation)', 'invitation', 'invitations', 73 * 3600],
  ] as const)('answers 410 when it is %s', async (_what, purpose, path, seconds) => {
    const user = await buildUser('guardian')
    const token = await linkFor(user.id, purpose)
    const later = new Date(Date.now() + seconds * 1000)
    setClock(() => later)
    expect((await confirm(path, token)).status).toBe(410)
    expect((await signIn(user.email, testPassword)).status).toBe(200)
  })

  it.each([0, true, [], {}, '', 'abc', 'a'.repeat(44)])('answers 422 to the token %j', async (token) => {
    expect((await confirm('invitations', token)).status).toBe(422)
  })

  it('is asked for the same way whether the address is known or not, and points to the configured address', async () => {
    const user = await buildUser('guardian')
    const known = await client()
      .post('/api/password-resets')
      .set('Host', 'evil.example')
      .send({ email: user.email })
    const unknown = await client().post('/api/password-resets').send({ email: 'nobody@harrowmere.example' })
    expect([known.status, unknown.status]).toEqual([204, 204])
    const mails = await database().query(
      "SELECT CONVERT(mime USING utf8mb4) AS mime FROM outbox_messages WHERE kind = 'password_reset' AND recipient = ?",
      [user.email],
    )
    expect(mails).toHaveLength(1)
    expect(mails[0].mime).not.toContain('evil.example')
    const stored = await database().query('SELECT HEX(tokenHash) AS hash FROM user_tokens WHERE userId = ?', [
      user.id,
    ])
    expect(stored).toHaveLength(1)
    const token = /#([\w-]{43})/.exec(mails[0].mime.replace(/=\r?\n/g, '').replace(/=3D/g, '='))?.[1]
    expect(token).toBeDefined()
    expect((await confirm('password-resets', token)).status).toBe(204)
  })

  it('is sent at most three times an hour to one address', async () => {
    const user = await buildUser('guardian')
    const ask = () => client().post('/api/password-resets').send({ email: user.email })
    for (let n = 0; n < 3; n += 1) expect((await ask()).status).toBe(204)
    const fourth = await ask()
    expect(fourth.status).toBe(429)
    expect(Number(fourth.headers['retry-after'])).toBeGreaterThan(3000)
  })
})

describe('a new password', () => {
  it.each([
    ['14 characters', 'k'.repeat(6) + 'marmalad', 422],
    ['15 characters with an emoji and spaces', 'kite 🪁 marmalade', 204],
    ['64 characters', 'kestrel marmalade viaduct walnut lantern harbour thimble oystery', 204],
    ['129 characters', 'kestrel marmalade '.repeat(8).slice(0, 129), 422],
    ['20 lower-case letters', 'kestrelmarmaladevias', 204],
  ])('of %s answers as the length rule says', async (_what, password, status) => {
    const user = await buildUser('guardian')
    expect((await confirm('invitations', await linkFor(user.id, 'invitation'), password)).status).toBe(status)
  })

  it('is refused when it is a common one, said twice, or the words of the clinic or the person', async () => {
    const common = dictionary['passwords-common'].filter((word): word is string => typeof word === 'string')
    const long = common.filter((word) => word.length >= 8).map((word) => `${word}${word}`)
    expect(long.length).toBeGreaterThan(3000)
    const sample = long.filter((_, index) => index % Math.floor(long.length / 100) === 0)
    for (const password of sample) expect(weakness(password, []), password).not.toBeNull()
    for (const password of [
      'fanflowerfanflower',
      'therapist-fanflower-1',
      '123456789012345',
      'aaaaaaaaaaaaaaaaaaa',
      'Marigold Quimby 2026',
    ])
      expect(weakness(password, ['Marigold Quimby', 'quimby@harrowmere.example']), password).not.toBeNull()
    expect(weakness(goodPassword, ['Marigold Quimby'])).toBeNull()
  })

  it('is told beside the field why it is refused', async () => {
    const user = await buildUser('guardian')
    const response = await confirm('invitations', await linkFor(user.id, 'invitation'), 'passwordpassword')
    expect(response.status).toBe(422)
    expect(response.body.fields.newPassword).toMatch(/common/)
  })
})

describe('a stored password', () => {
  it('is argon2id with 19 MiB, two passes and a salt of its own', async () => {
    const [one, two] = await Promise.all([hashPassword(goodPassword), hashPassword(goodPassword)])
    expect(one).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/)
    expect(one).not.toBe(two)
  })

  it('counts every character: past the 72nd, at the end, and é however it was typed', async () => {
    const start = 'kestrel marmalade viaduct walnut lantern harbour thimble oyster quarry a'
    expect(start).toHaveLength(72)
    const stored = await hashPassword(`${start}one`)
    expect(await verifyPassword(stored, `${start}two`)).toBe(false)
    expect(await verifyPassword(await hashPassword('kestrel marmalade '), 'kestrel marmalade')).toBe(false)
    expect(
      await verifyPassword(await hashPassword('caf\u00e9 marmalade kestrel'), 'cafe\u0301 marmalade kestrel'),
    ).toBe(true)
  })
})

describe('changing the own password', () => {
  it('needs the current one, ends the other sign-ins and sends a notice without the password', async () => {
    const user = await buildUser('therapist')
    const [here, elsewhere] = [await signedInAs(user), await signedInAs(user)]
    const wrong = await here
      .post('/api/me/password')
      .send({ currentPassword: 'not this one', newPassword: goodPassword })
    expect(wrong.status).toBe(403)
    expect((await elsewhere.get('/api/session')).body.user).not.toBeNull()
    const changed = await here
      .post('/api/me/password')
      .send({ currentPassword: testPassword, newPassword: goodPassword })
    expect(changed.status).toBe(204)
    expect((await elsewhere.get('/api/session')).body.user).toBeNull()
    expect((await here.get('/api/session')).body.user).not.toBeNull()
    const mails = await database().query(
      'SELECT CONVERT(mime USING utf8mb4) AS mime FROM outbox_messages WHERE recipient = ?',
      [user.email],
    )
    expect(mails).toHaveLength(1)
    expect(mails[0].mime).not.toContain('marmalade')
  })
})
