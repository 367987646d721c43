import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildUser, testPassword } from '../support/factories.ts'
import { statementsOf } from '../support/queries.ts'

beforeAll(startApp)
afterAll(stopApp)
afterEach(() => setClock(() => new Date()))

const at = (base: Date, seconds: number) => setClock(() => new Date(base.getTime() + seconds * 1000))
const whoAmI = async (who: Client) => (await who.get('/api/session')).body.user as { id: string } | null
const credentials = (email: string, password = testPassword) => ({ email, password, sharedComputer: false })

describe('signing in', () => {
  it('answers who is signed in, and sets a cookie that scripts and other sites cannot use', async () => {
    const user = await buildUser('therapist')
    const response = await client().post('/api/sign-in').send(credentials(user.email))
    expect(response.status).toBe(200)
    expect(response.body.user).toMatchObject({ id: user.id, roles: ['therapist'], workingHand: 'left' })
    const [cookie] = ([] as string[]).concat(response.headers['set-cookie'] ?? [])
    expect(cookie).toMatch(/HttpOnly/)
    expect(cookie).toMatch(/SameSite=Strict/)
    expect(cookie).not.toMatch(/Domain/)
  })

  it('keeps no cookie value in the database', async () => {
    const user = await buildUser('therapist')
    const { cookie } = await signedInAs(user)
    const rows = await database().query('SELECT HEX(idHash) AS hash, data FROM user_sessions')
    const ids = cookie.map(
      (pair) =>
        decodeURIComponent(pair.split('=')[1] ?? '')
          .replace(/^s:/, '')
          .split('.')[0] ?? '',
    )
    for (const id of ids) expect(JSON.stringify(rows)).not.toContain(id)
  })

  it('gives a new id at sign-in and refuses the one from before', async () => {
    const user = await buildUser('therapist')
    const planted = ['fanflower=s%3Aplanted.signature']
    const response = await client('none', planted).post('/api/sign-in').send(credentials(user.email))
    expect(response.status).toBe(200)
    expect(await whoAmI(client(user.id, planted))).toBeNull()
  })

  it('answers an unknown address and a wrong password alike', async () => {
    const user = await buildUser('therapist')
    const wrong = await client().post('/api/sign-in').send(credentials(user.email, 'not the right password'))
    const unknown = await client()
      .post('/api/sign-in')
      .send(credentials('nobody@harrowmere.example', 'not the right password'))
    const body = ({ requestId: _, ...rest }: Record<string, unknown>) => rest
    expect(wrong.status).toBe(401)
    expect(unknown.status).toBe(401)
    expect(body(unknown.body)).toEqual(body(wrong.body))
  })

  it('lets a disabled account in nowhere, from the very next request, 100 times of 100', async () => {
    const user = await buildUser('therapist')
    for (let round = 0; round < 100; round += 1) {
      const signedIn = await signedInAs(user)
      await database().query('UPDATE users SET disabledAt = NOW(6) WHERE id = ?', [user.id])
      const next = await signedIn.patch('/api/me').send({ workingHand: 'right', theme: 'dark' })
      expect(next.status).toBe(401)
      await database().query('UPDATE users SET disabledAt = NULL WHERE id = ?', [user.id])
    }
    await database().query('UPDATE users SET disabledAt = NOW(6) WHERE id = ?', [user.id])
    expect((await client().post('/api/sign-in').send(credentials(user.email))).status).toBe(401)
  }, 60_000)
})

describe('the end of a sign-in', () => {
  it.each([
    ['29:59 idle', [29 * 60 + 59], true],
    ['30:01 idle', [30 * 60 + 1], false],
    ['11:59:59 with activity', [...Array(30).keys()].map((n) => (n + 1) * 1400).concat(12 * 3600 - 1), true],
    ['12:00:01 with activity', [...Array(30).keys()].map((n) => (n + 1) * 1400).concat(12 * 3600 + 1), false],
  ])('comes after 30 minutes idle or 12 hours: %s', async (_what, moments, alive) => {
    const start = new Date()
    at(start, 0)
    const user = await buildUser('therapist')
    const signedIn = await signedInAs(user)
    for (const seconds of moments.slice(0, -1)) {
      at(start, seconds)
      await signedIn.get('/api/session')
    }
    at(start, moments.at(-1)!)
    expect((await whoAmI(signedIn)) !== null).toBe(alive)
  })

  it('comes after 15 minutes on a shared computer, and polls in the background do not put it off', async () => {
    const start = new Date()
    at(start, 0)
    const user = await buildUser('therapist')
    const response = await client()
      .post('/api/sign-in')
      .send({ ...credentials(user.email), sharedComputer: true })
    const cookies = ([] as string[])
      .concat(response.headers['set-cookie'] ?? [])
      .map((line) => line.split(';')[0] ?? '')
    const shared = client(user.id, cookies)
    for (const minute of [5, 10, 14]) {
      at(start, minute * 60)
      await shared.get('/api/session').set('X-Fanflower-Background', '1')
    }
    at(start, 15 * 60 + 1)
    expect(await whoAmI(shared)).toBeNull()
  })

  it('is put off at most every ten seconds, without a word to the database in between', async () => {
    const start = new Date()
    at(start, 0)
    const user = await buildUser('therapist')
    const signedIn = await signedInAs(user)
    const marksAt = async (seconds: number) => {
      at(start, seconds)
      const statements = await statementsOf(() => signedIn.get('/api/session'))
      return statements.filter((statement) => statement.startsWith('UPDATE user_sessions')).length
    }
    expect([await marksAt(1), await marksAt(9)]).toEqual([0, 0])
    expect([await marksAt(11), await marksAt(12), await marksAt(20)]).toEqual([1, 0, 0])
    expect(await marksAt(22)).toBe(1)
    const [row] = await database().query('SELECT lastSeenAt, data FROM user_sessions WHERE userId = ?', [
      user.id,
    ])
    expect(row.lastSeenAt.getTime()).toBe(start.getTime() + 22_000)
    expect(row.data).not.toContain('lastSeenAt')
  })

  it('is final: a request still in flight at sign-out does not bring it back', async () => {
    const user = await buildUser('therapist')
    for (let round = 0; round < 200; round += 1) {
      const signedIn = await signedInAs(user)
      const inFlight = Array.from({ length: 3 }, () =>
        signedIn.patch('/api/me').send({ workingHand: 'left', theme: 'dark' }),
      )
      await Promise.all([signedIn.post('/api/sign-out').send(), ...inFlight])
      expect(await whoAmI(signedIn)).toBeNull()
    }
  }, 60_000)
})

describe('requests from elsewhere', () => {
  it.each([
    ['without the header of our pages', { 'X-Fanflower-User': '' }, 403],
    ['from another origin', { Origin: 'https://elsewhere.example' }, 403],
    ['that the browser calls cross-site', { 'Sec-Fetch-Site': 'cross-site' }, 403],
    ['as plain text', { 'Content-Type': 'text/plain' }, 415],
    ['as a form', { 'Content-Type': 'application/x-www-form-urlencoded' }, 415],
  ])('are refused %s', async (_what, headers, status) => {
    const user = await buildUser('therapist')
    const signedIn = await signedInAs(user)
    const response = await signedIn
      .patch('/api/me')
      .set(headers)
      .send(JSON.stringify({ workingHand: 'right', theme: 'dark' }))
    expect(response.status).toBe(status)
    const [row] = await database().query('SELECT workingHand FROM users WHERE id = ?', [user.id])
    expect(row.workingHand).toBe('left')
  })

  it('of a page made for another person are refused when somebody else is signed in now', async () => {
    const [anna, ben] = [await buildUser('therapist'), await buildUser('therapist')]
    const { cookie } = await signedInAs(ben)
    const response = await client(anna.id, cookie)
      .patch('/api/me')
      .send({ workingHand: 'right', theme: 'dark' })
    expect(response.status).toBe(409)
    expect(response.body.code).toBe('session_changed')
  })
})

describe('guessing', () => {
  it('is slowed down after five failures, doubling, while the owner gets in from a known browser', async () => {
    const start = new Date()
    at(start, 0)
    const user = await buildUser('therapist')
    const known = await signedInAs(user)
    const guess = () => client().post('/api/sign-in').send(credentials(user.email, 'a wrong password here'))
    for (let n = 0; n < 6; n += 1) expect((await guess()).status).toBe(401)
    const slowed = await guess()
    expect(slowed.status).toBe(429)
    expect(slowed.headers['retry-after']).toBe('1')
    const device = known.cookie.filter((pair) => pair.includes('device'))
    const owner = await client('none', device).post('/api/sign-in').send(credentials(user.email))
    expect(owner.status).toBe(200)
  })

  it('lets at most 100 of 1000 guesses reach the hash', async () => {
    const start = new Date()
    const user = await buildUser('therapist')
    let judged = 0
    for (let n = 0; n < 1000; n += 1) {
      at(start, n * 1000)
      const response = await client()
        .post('/api/sign-in')
        .send(credentials(user.email, 'a wrong password here'))
      if (response.status === 401) judged += 1
    }
    expect(judged).toBe(100)
  }, 60_000)
})
