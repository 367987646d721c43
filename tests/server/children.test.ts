import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { ChildIdentity, ChildIdentityView } from '../../shared/children.ts'
import type { User } from '../../server/entities/User.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'

let holder: User
let colleague: User
let leadUser: User
let therapist: Client
let other: Client
let lead: Client
let administrator: Client

beforeAll(async () => {
  await startApp()
  holder = await buildUser('therapist', { displayName: 'Hedda Holder' })
  colleague = await buildUser('therapist', { displayName: 'Colm League' })
  leadUser = await buildUser('clinicLead')
  therapist = await signedInAs(holder)
  other = await signedInAs(colleague)
  lead = await signedInAs(leadUser)
  administrator = await signedInAs(await buildUser('administrator'))
})
afterAll(stopApp)

describe('the head of a record', () => {
  it('names the child, the school, who holds it, and what one must know', async () => {
    const schoolClass = await buildClass()
    const child = await buildChild({
      therapist: holder,
      schoolClassId: schoolClass.id,
      interpreterLanguage: 'Dari',
      lookedAfter: true,
    })
    await buildGuardian(child, null, { courtOrder: true })
    const { body } = await therapist.get(`/api/children/${child.id}`)
    expect(body).toMatchObject({
      recordNumber: child.recordNumber,
      name: `${child.givenName} ${child.familyName}`,
      relation: 'assignedTherapist',
      className: schoolClass.name,
      interpreterLanguage: 'Dari',
      lookedAfter: true,
      courtOrder: true,
      state: 'active',
      therapist: 'Hedda Holder',
      alerts: [],
      namesake: false,
      can: { writeNote: true, startLetter: true },
    })
    expect(body.sections).toHaveLength(9)
    expect(body.age).toMatch(/^\d+ y \d+ m$/)
  })

  it('offers writing to the therapist who holds the child, and to nobody else', async () => {
    const child = await buildChild({ therapist: holder })
    for (const who of [lead, administrator])
      expect((await who.get(`/api/children/${child.id}`)).body.can).toEqual({
        writeNote: false,
        startLetter: false,
      })
    const { body } = await therapist.get(`/api/children/${child.id}/glance`)
    expect(body.child.can).toEqual({ writeNote: true, startLetter: true })
  })

  it('says that another child bears the same name', async () => {
    const one = await buildChild({ therapist: holder, givenName: 'Zoë', familyName: 'Twofold' })
    await buildChild({ givenName: 'zoe', familyName: 'TWOFOLD', birthDate: '2016-01-01' })
    expect((await therapist.get(`/api/children/${one.id}`)).body.namesake).toBe(true)
  })

  it('shows an administrator identity and family only, nothing clinical', async () => {
    const child = await buildChild({ therapist: holder })
    const { body } = await administrator.get(`/api/children/${child.id}`)
    expect([body.state, body.alerts, body.sections, body.therapist]).toEqual([
      null,
      [],
      ['family'],
      'Hedda Holder',
    ])
  })

  it('is closed: another therapist and strangers 404, parent and teacher 403, signed out 401', async () => {
    const teacher = await buildUser('teacher')
    const schoolClass = await buildClass(teacher)
    const child = await buildChild({ therapist: holder, schoolClassId: schoolClass.id })
    await giveConsent(child, 'share_school_seating', leadUser)
    const parent = await buildUser('guardian')
    await buildGuardian(child, parent)
    const stranger = await signedInAs(await buildUser('guardian'))
    const path = `/api/children/${child.id}`
    const absent = await other.get(`/api/children/${randomUUID()}`)
    const notTheirs = await other.get(path)
    expect(notTheirs.status).toBe(404)
    expect({ ...notTheirs.body, requestId: '' }).toEqual({ ...absent.body, requestId: '' })
    expect((await stranger.get(path)).status).toBe(404)
    expect((await (await signedInAs(parent)).get(path)).status).toBe(403)
    expect((await (await signedInAs(teacher)).get(path)).status).toBe(403)
    expect((await client().get(path)).status).toBe(401)
    for (const section of ['glance', 'identity'])
      expect((await other.get(`${path}/${section}`)).status).toBe(404)
    expect((await administrator.get(`${path}/glance`)).status).toBe(403)
    expect((await administrator.get(`${path}/identity`)).status).toBe(200)
  })
})

describe('finding a child', () => {
  it('looks by any part of name or number, among the children one may see', async () => {
    const own = await buildChild({ therapist: holder, givenName: 'Findable', familyName: 'Ownbrook' })
    const theirs = await buildChild({ therapist: colleague, givenName: 'Findable', familyName: 'Otherbrook' })
    const find = async (who: Client, q: string) =>
      (await who.get('/api/children/find').query({ q })).body.map((child: { id: string }) => child.id)
    expect(await find(therapist, 'brook findable')).toEqual([own.id])
    expect(await find(therapist, own.recordNumber)).toEqual([own.id])
    expect(await find(therapist, theirs.recordNumber)).toEqual([])
    expect((await find(lead, 'findable')).sort()).toEqual([own.id, theirs.id].sort())
    expect(await find(administrator, 'findable')).toHaveLength(2)
    expect(await find(lead, 'f')).toEqual([])
    expect(await find(lead, '%%')).toEqual([])
  })

  it('leaves out one’s own child, and is for staff', async () => {
    const child = await buildChild({ familyName: 'Leadsown' })
    await buildGuardian(child, leadUser)
    expect((await lead.get('/api/children/find?q=Leadsown')).body).toEqual([])
    expect((await administrator.get('/api/children/find?q=Leadsown')).body).toHaveLength(1)
    const teacher = await signedInAs(await buildUser('teacher'))
    expect((await teacher.get('/api/children/find?q=Leadsown')).status).toBe(403)
  })
})

describe('the register', () => {
  it('is the administrator’s: identity, school and contact, paged, without clinical fields', async () => {
    for (const number of [1, 2, 3])
      await buildChild({ givenName: `Reg${number}`, familyName: 'Registered', therapist: holder })
    const { body } = await administrator.get('/api/children?search=Registered&size=2&page=2')
    expect(body).toMatchObject({ total: 3, page: 2, size: 2 })
    expect(Object.keys(body.rows[0]).sort()).toEqual(
      ['birthDate', 'carers', 'className', 'id', 'name', 'recordNumber', 'school', 'therapist'].sort(),
    )
    expect((await lead.get('/api/children')).status).toBe(403)
    expect((await therapist.get('/api/children')).status).toBe(403)
  })
})

const identityOf = ({
  id: _id,
  recordNumber: _number,
  version: _version,
  can: _can,
  ...rest
}: ChildIdentityView) => rest as ChildIdentity

describe('identity', () => {
  const read = async (who: Client, childId: string) =>
    (await who.get(`/api/children/${childId}/identity`)).body as ChildIdentityView
  const save = (who: Client, childId: string, identity: object, version: number) =>
    who.put(`/api/children/${childId}/identity`).set('If-Match', `"${version}"`).send(identity)

  it('is corrected by the office, each version once', async () => {
    const child = await buildChild({ therapist: holder })
    const before = await read(administrator, child.id)
    expect(before.can.change).toBe(true)
    const next = { ...identityOf(before), preferredName: 'Ottí 🖐', homeLanguages: 'Dari, English' }
    const saved = await save(administrator, child.id, next, before.version)
    expect(saved.body).toMatchObject({ preferredName: 'Ottí 🖐', version: before.version + 1 })
    const late = await save(therapist, child.id, { ...next, preferredName: 'Late' }, before.version)
    expect([late.status, late.body.code, late.body.current.preferredName]).toEqual([409, 'stale', 'Ottí 🖐'])
  })

  it.each([
    ['birthDate', '2030-01-01'],
    ['birthDate', '1990-01-01'],
    ['familyName', ' '],
    ['classId', randomUUID()],
    ['scriptDirection', 'up'],
    ['writingHand', 'left'],
  ])('refuses %s = %j', async (field, value) => {
    const child = await buildChild({ therapist: holder })
    const before = await read(therapist, child.id)
    const answer = await save(therapist, child.id, { ...identityOf(before), [field]: value }, before.version)
    expect(answer.status).toBe(422)
    expect((await read(therapist, child.id)).version).toBe(before.version)
  })

  it('leaves it to the therapist whether a young person decides alone', async () => {
    const child = await buildChild({ therapist: holder })
    const before = await read(therapist, child.id)
    const next = { ...identityOf(before), consentsForSelf: true }
    const office = await save(administrator, child.id, next, before.version)
    expect([office.status, Object.keys(office.body.fields)]).toEqual([422, ['consentsForSelf']])
    expect((await save(therapist, child.id, next, before.version)).status).toBe(200)
    expect((await save(other, child.id, next, before.version)).status).toBe(404)
    const unversioned = await therapist.put(`/api/children/${child.id}/identity`).send(next)
    expect(unversioned.status).toBe(428)
  })
})
