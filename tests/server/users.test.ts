import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { UserRow } from '../../shared/users.ts'
import { selectOne, selectRows } from '../../server/queries/sql.ts'
import type { User } from '../../server/entities/User.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildUser, testPassword } from '../support/factories.ts'
import { invitationToken, mailsTo } from '../support/invitations.ts'

let administrator: Client
let lead: Client
let therapist: Client
let administratorUser: User

beforeAll(async () => {
  await startApp()
  administratorUser = await buildUser('administrator', { displayName: 'Petra Office' })
  administrator = await signedInAs(administratorUser)
  lead = await signedInAs(await buildUser('clinicLead'))
  therapist = await signedInAs(await buildUser('therapist'))
})
afterAll(stopApp)

let number = 0
const invitation = (given: object = {}) => ({
  displayName: 'Nadia Newcomer',
  email: `newcomer${(number += 1)}@harrowmere.example`,
  roles: ['therapist'],
  newlyQualified: true,
  ...given,
})
const list = async (who: Client, query = '?size=100') =>
  (await who.get(`/api/users${query}`)).body.rows as UserRow[]
const rowOf = async (id: string) => (await list(administrator)).find((row) => row.id === id)

describe('inviting a colleague', () => {
  it('makes an account without password and sends one link that opens it', async () => {
    const form = invitation()
    const invited = await administrator.post('/api/invitations').send(form)
    expect(invited.status).toBe(201)
    expect(invited.body).toMatchObject({
      displayName: 'Nadia Newcomer',
      roles: ['therapist'],
      newlyQualified: true,
      state: 'invited',
      lastSignInAt: null,
    })
    const [mail] = await mailsTo(form.email)
    expect([mail?.kind, mail?.state]).toEqual(['invitation', 'queued'])
    const stored = await selectOne('SELECT passwordHash FROM users WHERE email = :email', {
      email: form.email,
    })
    expect(stored).toEqual({ passwordHash: null })
    const early = await client()
      .post('/api/sign-in')
      .send({ email: form.email, password: testPassword, sharedComputer: false })
    expect(early.status).toBe(401)

    const token = await invitationToken(form.email)
    const confirmed = await client()
      .post('/api/invitations/confirm')
      .send({ token, newPassword: testPassword })
    expect(confirmed.status).toBe(204)
    const asNewcomer = await signedInAs({ id: invited.body.id, email: form.email })
    expect((await asNewcomer.get('/api/caseload')).status).toBe(200)
    expect((await rowOf(invited.body.id))?.state).toBe('active')
  })

  it('sends one e-mail when the same form arrives twice', async () => {
    const form = invitation()
    const key = randomUUID()
    const send = () => administrator.post('/api/invitations').set('Idempotency-Key', key).send(form)
    const [first, second] = await Promise.all([send(), send()])
    expect(first.body.id).toBe(second.body.id)
    expect(await mailsTo(form.email)).toHaveLength(1)
  })

  it('is open to the lead for staff, to the administrator for teachers too, and never for carers', async () => {
    expect((await lead.post('/api/invitations').send(invitation())).status).toBe(201)
    const teacher = await lead.post('/api/invitations').send(invitation({ roles: ['teacher'] }))
    expect([teacher.status, Object.keys(teacher.body.fields)]).toEqual([422, ['roles']])
    expect(
      (await administrator.post('/api/invitations').send(invitation({ roles: ['teacher'] }))).status,
    ).toBe(201)
    for (const who of [lead, administrator]) {
      const carer = await who.post('/api/invitations').send(invitation({ roles: ['guardian'] }))
      expect([carer.status, Object.keys(carer.body.fields)]).toEqual([422, ['roles']])
    }
    expect((await therapist.post('/api/invitations').send(invitation())).status).toBe(403)
    expect((await client().post('/api/invitations').send(invitation())).status).toBe(401)
  })

  it.each([
    ['email', 'a@b.example, c@d.example'],
    ['email', 'nobody'],
    ['roles', []],
    ['roles', ['owner']],
    ['displayName', 'X'],
    ['newlyQualified', 'yes'],
    ['passwordHash', 'x'],
  ])('refuses %s = %j', async (field, value) => {
    const form = { ...invitation(), [field]: value }
    expect((await administrator.post('/api/invitations').send(form)).status).toBe(422)
    expect(await mailsTo(String(form.email))).toEqual([])
  })

  it('refuses an address that has an account, whatever its case', async () => {
    const known = await buildUser('therapist')
    const answer = await administrator
      .post('/api/invitations')
      .send(invitation({ email: known.email.toUpperCase() }))
    expect([answer.status, Object.keys(answer.body.fields)]).toEqual([422, ['email']])
  })
})

describe('the list of people', () => {
  it('shows an administrator everybody, and a lead colleagues without sign-ins and carers', async () => {
    const carer = await buildUser('guardian', { displayName: 'Carla Carer' })
    const both = await buildUser('therapist', {
      displayName: 'Tessa Twohats',
      roles: ['therapist', 'guardian'],
    })
    const every = await list(administrator)
    expect(every.find((row) => row.id === carer.id)).toMatchObject({ roles: ['guardian'], state: 'active' })
    expect(every.find((row) => row.id === administratorUser.id)?.lastSignInAt).not.toBeNull()
    const colleagues = await list(lead)
    expect(colleagues.some((row) => row.id === carer.id)).toBe(false)
    expect(colleagues.find((row) => row.id === both.id)?.roles).toEqual(['therapist'])
    expect(colleagues.every((row) => row.lastSignInAt === null)).toBe(true)
  })

  it('finds by name or address and pages', async () => {
    for (const letter of ['A', 'B', 'C']) await buildUser('therapist', { displayName: `Pageable ${letter}` })
    const second = await administrator.get('/api/users?search=pageable&size=2&page=2')
    expect(second.body).toMatchObject({ total: 3, page: 2 })
    expect(second.body.rows.map((row: UserRow) => row.displayName)).toEqual(['Pageable C'])
    expect(await list(administrator, '?search=%25')).toEqual([])
  })

  it('narrows to one role, and tells a lead nothing about who is a carer', async () => {
    const teacher = await buildUser('teacher', { displayName: 'Thea Classroom' })
    const both = await buildUser('teacher', {
      displayName: 'Tobias Twohats',
      roles: ['teacher', 'guardian'],
    })
    for (const who of [administrator, lead]) {
      const teachers = await list(who, '?role=teacher&size=100')
      expect(teachers.map(({ id }) => id)).toEqual(expect.arrayContaining([teacher.id, both.id]))
      expect(teachers.every(({ roles }) => roles.includes('teacher'))).toBe(true)
    }
    const found = await administrator.get('/api/users?role=teacher&search=classroom&size=1')
    expect(found.body).toMatchObject({ total: 1, rows: [{ id: teacher.id }] })
    expect((await list(administrator, '?role=guardian&size=100')).map(({ id }) => id)).toContain(both.id)
    for (const [who, role] of [
      [lead, 'guardian'],
      [administrator, 'owner'],
    ] as const) {
      const refused = await who.get(`/api/users?role=${role}`)
      expect([refused.status, Object.keys(refused.body.fields)]).toEqual([422, ['role']])
    }
  })

  it('is closed to therapists, teachers and parents', async () => {
    for (const role of ['therapist', 'teacher', 'guardian'] as const)
      expect((await (await signedInAs(await buildUser(role))).get('/api/users')).status).toBe(403)
  })
})

describe('changing what a person may do', () => {
  const change = (who: Client, id: string, version: number, roles: string[], newlyQualified = false) =>
    who.patch(`/api/users/${id}`).set('If-Match', `"${version}"`).send({ roles, newlyQualified })
  const versionOf = async (id: string) => (await rowOf(id))?.version ?? 0

  it('takes effect at once and asks them to sign in anew', async () => {
    const person = await buildUser('therapist')
    const asPerson = await signedInAs(person)
    const changed = await change(administrator, person.id, await versionOf(person.id), ['administrator'])
    expect([changed.status, changed.body.roles]).toEqual([200, ['administrator']])
    expect((await asPerson.get('/api/caseload')).status).toBe(401)
    const again = await signedInAs(person)
    expect((await again.get('/api/caseload')).status).toBe(403)
    expect((await again.get('/api/children')).status).toBe(200)
    const late = await change(administrator, person.id, 1, ['clinicLead'])
    expect([late.status, late.body.code, late.body.current.roles]).toEqual([409, 'stale', ['administrator']])
  })

  it('is never done to oneself, nor by a lead', async () => {
    const own = administratorUser.id
    const self = await change(administrator, own, await versionOf(own), ['administrator', 'clinicLead'])
    expect(self.status).toBe(403)
    expect((await rowOf(own))?.roles).toEqual(['administrator'])
    const person = await buildUser('therapist')
    expect((await change(lead, person.id, 1, ['administrator'])).status).toBe(403)
    expect((await administrator.patch(`/api/users/${person.id}`).send({ roles: ['teacher'] })).status).toBe(
      428,
    )
    expect((await change(administrator, randomUUID(), 1, ['teacher'])).status).toBe(404)
  })

  it('keeps a therapist who holds open cases, and leaves carers to the family page', async () => {
    const holder = await buildUser('therapist')
    await buildChild({ therapist: holder })
    const taken = await change(administrator, holder.id, 1, ['clinicLead'])
    expect([taken.status, Object.keys(taken.body.fields)]).toEqual([422, ['roles']])
    const carer = await buildUser('guardian')
    for (const [id, roles] of [
      [holder.id, ['therapist', 'guardian']],
      [carer.id, ['teacher']],
    ] as const)
      expect((await change(administrator, id, 1, [...roles])).body.fields).toHaveProperty('roles')
  })
})

describe('closing an account', () => {
  const act = (who: Client, id: string, what: 'disable' | 'enable') =>
    who.post(`/api/users/${id}/${what}`).send({})

  it('ends every sign-in with the next request, and its links; opening lets them sign in again', async () => {
    const person = await buildUser('therapist')
    await buildChild({ therapist: person })
    const [one, two] = [await signedInAs(person), await signedInAs(person)]
    expect((await act(lead, person.id, 'disable')).status).toBe(204)
    for (const browser of [one, two]) expect((await browser.get('/api/caseload')).status).toBe(401)
    await expect(signedInAs(person)).rejects.toThrow('401')
    expect((await rowOf(person.id))?.state).toBe('disabled')
    expect((await act(lead, person.id, 'disable')).body.code).toBe('closed')
    const tasks = await selectRows<{ text: string }>(
      "SELECT text FROM tasks WHERE kind = 'cases_without_therapist'",
    )
    expect(tasks).toHaveLength(1)

    expect((await act(administrator, person.id, 'enable')).status).toBe(204)
    expect((await one.get('/api/caseload')).status).toBe(401)
    expect((await (await signedInAs(person)).get('/api/caseload')).status).toBe(200)
  })

  it('stops an invitation that is still open', async () => {
    const form = invitation()
    const { body } = await administrator.post('/api/invitations').send(form)
    const token = await invitationToken(form.email)
    await act(administrator, body.id, 'disable')
    const confirmed = await client()
      .post('/api/invitations/confirm')
      .send({ token, newPassword: testPassword })
    expect(confirmed.status).toBe(410)
  })

  it('is not done to oneself; a lead closes staff only and knows no carers', async () => {
    expect((await act(administrator, administratorUser.id, 'disable')).status).toBe(403)
    const teacher = await buildUser('teacher')
    expect((await act(lead, teacher.id, 'disable')).status).toBe(403)
    const carer = await buildUser('guardian')
    expect((await act(lead, carer.id, 'disable')).status).toBe(404)
    expect((await act(administrator, carer.id, 'disable')).status).toBe(204)
    expect((await act(therapist, teacher.id, 'disable')).status).toBe(403)
    expect((await act(administrator, randomUUID(), 'disable')).status).toBe(404)
  })
})
