import { randomUUID } from 'node:crypto'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { consentPurposes } from '../../shared/consents.ts'
import type { MyChildView, MyConsent } from '../../shared/family.ts'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Consent } from '../../server/entities/Consent.ts'
import { Goal } from '../../server/entities/Goal.ts'
import { Guardian } from '../../server/entities/Guardian.ts'
import { Task } from '../../server/entities/Task.ts'
import type { User } from '../../server/entities/User.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'

beforeAll(startApp)
afterAll(stopApp)
afterEach(() => setClock(() => new Date()))

let therapist: User
let mother: User
let father: User
let asMother: Client
let asFather: Client
let child: Child
let motherRow: Guardian
let fatherRow: Guardian

// Strings that stand nowhere else: found in an answer, they came from the row they belong to.
const fathersOwn = { phone: '0161 496 0777', address: '12 Canary Wharf Lane, Fathertown' }
const mothersOwn = { phone: '0161 496 0555', address: '3 Nightjar Row, Mothertown' }

beforeAll(async () => {
  therapist = await buildUser('therapist', { displayName: 'Adaeze Nwosu-Reid' })
  mother = await buildUser('guardian', { displayName: 'Mira Solberg' })
  father = await buildUser('guardian', { displayName: 'Falk Otherhome' })
  asMother = await signedInAs(mother)
  asFather = await signedInAs(father)
})

beforeEach(async () => {
  const schoolClass = await buildClass()
  child = await buildChild({ therapist, preferredName: 'Juno', schoolClassId: schoolClass.id })
  motherRow = await buildGuardian(child, mother, mothersOwn)
  fatherRow = await buildGuardian(child, father, { relation: 'father', ...fathersOwn })
})

const at = (path = '', of: Pick<Child, 'id'> = child) => `/api/my/children/${of.id}${path}`
const seenBy = async (as: Client): Promise<MyChildView> => {
  const response = await as.get(at())
  expect(response.status, response.text).toBe(200)
  return response.body
}
const consentSeenBy = async (as: Client, purpose: MyConsent['purpose']) =>
  (await seenBy(as)).consents.find((consent) => consent.purpose === purpose)
const rowOf = (guardian: Guardian) => database().manager.findOneByOrFail(Guardian, { id: guardian.id })
const consentRows = (of: Pick<Child, 'id'> = child) =>
  database().manager.find(Consent, { where: { childId: of.id }, order: { at: 'ASC' } })
const give = (as: Client, purpose: string) => as.post(at('/consents')).send({ purpose })
const withdraw = (as: Client, consentId: string, reason: string | null = null) =>
  as.post(at(`/consents/${consentId}/withdraw`)).send({ reason })

describe('a carer’s own children', () => {
  it('are listed with their therapist, and nobody else’s child is', async () => {
    await buildGuardian(await buildChild({ preferredName: 'Somebody' }), await buildUser('guardian'))
    const response = await asMother.get('/api/my/children')
    expect(response.status).toBe(200)
    expect(response.body).toContainEqual({
      id: child.id,
      name: `Juno ${child.familyName}`,
      therapist: 'Adaeze Nwosu-Reid',
      unreadLetters: 0,
    })
    expect(response.text).not.toContain('Somebody')
  })

  it.each(['therapist', 'clinicLead', 'administrator', 'teacher'] as const)(
    'are not an address for a %s',
    async (role) => {
      const as = role === 'therapist' ? await signedInAs(therapist) : await signedInAs(await buildUser(role))
      expect((await as.get('/api/my/children')).status).toBe(403)
      expect((await as.get(at())).status).toBe(404)
      expect((await as.put(at('/contact')).set('If-Match', '"1"').send(mothersOwn)).status).toBe(404)
      expect((await as.post(at('/consents')).send({ purpose: 'video' })).status).toBe(404)
    },
  )

  it('show exactly what belongs to this carer', async () => {
    const view = await seenBy(asMother)
    expect(Object.keys(view).toSorted()).toEqual(
      [
        'birthDate',
        'clinic',
        'consents',
        'goals',
        'id',
        'letters',
        'name',
        'ownContact',
        'school',
        'therapist',
      ].toSorted(),
    )
    expect(view).toMatchObject({
      name: `Juno ${child.familyName}`,
      birthDate: '2018-05-04',
      school: expect.stringMatching(/^School/),
      letters: [],
      clinic: { emergencyText: expect.stringContaining('emergency') },
      ownContact: { name: 'Mira Solberg', email: mother.email, ...mothersOwn, version: 1 },
    })
    expect(view.consents.map((consent) => consent.purpose)).toEqual([...consentPurposes])
  })

  it('show goals in the child’s words, without what the clinic wrote beside them', async () => {
    const details = {
      activity: 'CLINIC-ONLY activity text',
      childVoice: 'I want to write my own comics',
      levels: ['CLINIC-ONLY a', 'b level', 'c level', 'd level', 'e level'],
      baseline: -2,
      importance: 3,
      difficulty: 2,
      targetOn: '2027-03-01',
    }
    const goal = {
      childId: child.id,
      details,
      setById: therapist.id,
      createdAt: new Date(),
      setOn: '2026-11-01',
    }
    await database().manager.insert(Goal, { ...goal, id: randomUUID(), endedOn: null, outcome: null })
    await database().manager.insert(Goal, {
      ...goal,
      id: randomUUID(),
      details: { ...details, childVoice: 'An ended wish' },
      endedOn: '2026-11-20',
      outcome: 'finished',
    })
    const response = await asMother.get(at())
    expect(response.body.goals).toEqual(['I want to write my own comics'])
    expect(response.text).not.toContain('CLINIC-ONLY')
  })
})

describe('the other carer', () => {
  it('is nowhere in a carer’s answers: no address, phone, e-mail, name or account', async () => {
    await giveConsent(child, 'video', therapist, { guardianId: fatherRow.id, givenByName: 'Falk Otherhome' })
    await giveConsent(child, 'email_link', therapist, {
      guardianId: fatherRow.id,
      givenByName: 'Falk Otherhome',
    })
    const bodies = [await asMother.get('/api/my/children'), await asMother.get(at())]
    const saved = await asMother.put(at('/contact')).set('If-Match', '"1"').send(mothersOwn)
    const stale = await asMother.put(at('/contact')).set('If-Match', '"1"').send(mothersOwn)
    expect([saved.status, stale.status]).toEqual([200, 409])
    for (const { text, headers } of [...bodies, saved, stale]) {
      const all = text + JSON.stringify(headers)
      for (const canary of [
        fathersOwn.phone,
        fathersOwn.address,
        father.email,
        'Falk',
        fatherRow.id,
        father.id,
      ])
        expect(all).not.toContain(canary)
    }
  })

  it('keeps their e-mail choice to themselves', async () => {
    await giveConsent(child, 'email_link', therapist, { guardianId: fatherRow.id })
    expect(await consentSeenBy(asMother, 'email_link')).toMatchObject({ inForce: false, givenBy: null })
    expect(await consentSeenBy(asFather, 'email_link')).toMatchObject({
      inForce: true,
      can: { withdraw: true },
    })
  })

  it('leaves no trace when a restriction is set on them', async () => {
    const before = await asMother.get(at())
    await database().manager.update(Guardian, { id: fatherRow.id }, { restricted: true })
    const after = await asMother.get(at())
    expect(after.text).toBe(before.text)
    expect(after.text).not.toMatch(/restrict/i)
  })
})

describe('a carer’s own contact', () => {
  it('is changed in their own row alone', async () => {
    const next = { phone: '0161 496 0888', address: '4 New Street' }
    const response = await asMother.put(at('/contact')).set('If-Match', '"1"').send(next)
    expect(response.status).toBe(200)
    expect(response.body.ownContact).toMatchObject({ ...next, version: 2 })
    expect(await rowOf(motherRow)).toMatchObject({ ...next, name: 'Mira Solberg' })
    expect(await rowOf(fatherRow)).toMatchObject({ ...fathersOwn, version: 1 })
  })

  it('answers a stale save with what is stored, and changes nothing', async () => {
    await asMother.put(at('/contact')).set('If-Match', '"1"').send({ phone: '0161 496 0001', address: null })
    const late = await asMother.put(at('/contact')).set('If-Match', '"1"').send(mothersOwn)
    expect([late.status, late.body.code]).toEqual([409, 'stale'])
    expect(late.body.current).toMatchObject({ phone: '0161 496 0001', address: null, version: 2 })
    expect((await rowOf(motherRow)).phone).toBe('0161 496 0001')
  })

  it.each([
    ['a phone with letters', { phone: 'ring me', address: null }, 'phone'],
    ['an address longer than is kept', { phone: null, address: 'x'.repeat(301) }, 'address'],
    ['an e-mail address, which only the clinic changes', { ...mothersOwn, email: 'a@b.example' }, 'form'],
    ['parental responsibility', { ...mothersOwn, parentalResponsibility: 'yes' }, 'form'],
    ['a missing field', { phone: '0161 496 0001' }, 'address'],
  ])('refuses %s beside the field', async (_what, body, field) => {
    const response = await asMother.put(at('/contact')).set('If-Match', '"1"').send(body)
    expect([response.status, Object.keys(response.body.fields)]).toEqual([422, [field]])
    expect(await rowOf(motherRow)).toMatchObject({ ...mothersOwn, version: 1 })
  })

  it('needs the version it was made from', async () => {
    expect((await asMother.put(at('/contact')).send(mothersOwn)).status).toBe(428)
  })
})

describe('agreeing', () => {
  it('adds a consent in force, given signed in by this carer', async () => {
    expect((await give(asMother, 'share_school_seating')).status).toBe(204)
    const [row, ...more] = await consentRows()
    expect(more).toEqual([])
    expect(row).toMatchObject({
      purpose: 'share_school_seating',
      kind: 'given',
      method: 'signed_in',
      basis: 'parental_responsibility',
      guardianId: motherRow.id,
      givenByName: 'Mira Solberg',
      recordedById: mother.id,
      expiresAt: null,
    })
    expect(await consentSeenBy(asMother, 'share_school_seating')).toMatchObject({
      inForce: true,
      consentId: row?.id,
      givenBy: 'Mira Solberg',
      can: { give: false, withdraw: true },
    })
  })

  it('to e-mail binds it to this carer: for the other nothing changes', async () => {
    await give(asMother, 'email_attachment')
    expect((await consentRows())[0]?.guardianId).toBe(motherRow.id)
    expect(await consentSeenBy(asFather, 'email_attachment')).toMatchObject({
      inForce: false,
      can: { give: true, withdraw: false },
    })
  })

  it.each(['no', 'unknown'] as const)(
    'needs parental responsibility: "%s" is refused and adds nothing',
    async (parentalResponsibility) => {
      await database().manager.update(Guardian, { id: motherRow.id }, { parentalResponsibility })
      expect(await consentSeenBy(asMother, 'video')).toMatchObject({ can: { give: false, withdraw: false } })
      expect((await give(asMother, 'video')).status).toBe(403)
      expect(await consentRows()).toEqual([])
    },
  )

  it('twice says so and adds nothing, also when both clicks arrive together', async () => {
    const both = await Promise.all([give(asMother, 'video'), give(asMother, 'video')])
    expect(both.map(({ status }) => status).toSorted()).toEqual([204, 409])
    expect((await give(asMother, 'video')).body.code).toBe('duplicate')
    expect(await consentRows()).toHaveLength(1)
  })

  it('sent again under the same key answers as before, with one consent', async () => {
    const key = randomUUID()
    const send = () =>
      asMother.post(at('/consents')).set('Idempotency-Key', key).send({ purpose: 'teaching_use' })
    expect([(await send()).status, (await send()).status]).toEqual([204, 204])
    expect(await consentRows()).toHaveLength(1)
  })

  it.each([
    ['a purpose nobody knows', { purpose: 'everything' }, 'purpose'],
    ['a carer named in the form', { purpose: 'video', guardianId: randomUUID() }, 'form'],
  ])('refuses %s', async (_what, body, field) => {
    const response = await asMother.post(at('/consents')).send(body)
    expect([response.status, Object.keys(response.body.fields)]).toEqual([422, [field]])
    expect(await consentRows()).toEqual([])
  })

  it('passes to the young person once they consent for themselves', async () => {
    const young = await buildUser('guardian')
    const grown = await buildChild({ therapist, birthDate: '2010-02-01', consentsForSelf: true })
    await buildGuardian(grown, young, { relation: 'self', parentalResponsibility: 'no' })
    await buildGuardian(grown, mother)
    const asYoung = await signedInAs(young)
    const paths = at('/consents', grown)
    expect((await asMother.post(paths).send({ purpose: 'video' })).status).toBe(403)
    expect((await asYoung.post(paths).send({ purpose: 'video' })).status).toBe(204)
    expect((await consentRows(grown))[0]).toMatchObject({ basis: 'young_person_competent' })
  })
})

describe('stopping a consent', () => {
  it('takes a new row, leaves the old one as it was, and tells the therapist', async () => {
    await give(asMother, 'share_school_seating')
    const [given] = await consentRows()
    expect((await withdraw(asMother, given?.id ?? '', 'We have moved')).status).toBe(204)
    const [kept, ended] = await consentRows()
    expect(kept).toEqual(given)
    expect(ended).toMatchObject({
      kind: 'withdrawn',
      withdrawsId: given?.id,
      purpose: 'share_school_seating',
      reason: 'We have moved',
      method: 'signed_in',
      givenByName: 'Mira Solberg',
    })
    expect(await consentSeenBy(asMother, 'share_school_seating')).toMatchObject({
      inForce: false,
      can: { give: true, withdraw: false },
    })
    const tasks = await database().manager.findBy(Task, { childId: child.id })
    expect(tasks).toMatchObject([{ kind: 'consent_withdrawn', assigneeId: therapist.id, doneAt: null }])
    expect(tasks[0]?.text).not.toContain('Mira')
  })

  it('needs no reason', async () => {
    await give(asMother, 'video')
    const [given] = await consentRows()
    expect((await withdraw(asMother, given?.id ?? '', '')).status).toBe(204)
    expect((await consentRows())[1]?.reason).toBeNull()
  })

  it('goes to the lead as a task when no therapist holds the child', async () => {
    child = await buildChild()
    await buildGuardian(child, mother)
    await give(asMother, 'video')
    const [given] = await consentRows()
    await withdraw(asMother, given?.id ?? '')
    expect(await database().manager.findBy(Task, { childId: child.id })).toMatchObject([
      { assigneeId: null, forRole: 'clinicLead' },
    ])
  })

  it('twice, or once it has run out, answers 409 and adds nothing', async () => {
    const consent = await giveConsent(child, 'video', therapist, { guardianId: motherRow.id })
    const both = await Promise.all([withdraw(asMother, consent.id), withdraw(asMother, consent.id)])
    expect(both.map(({ status }) => status).toSorted()).toEqual([204, 409])
    const over = await giveConsent(child, 'video', therapist, { expiresAt: new Date(Date.now() - 1) })
    expect((await withdraw(asMother, over.id)).body.code).toBe('closed')
    expect(await consentRows()).toHaveLength(3)
  })

  it('is open to each person with parental responsibility, whoever agreed', async () => {
    await give(asFather, 'share_doctor')
    const seen = await consentSeenBy(asMother, 'share_doctor')
    expect(seen).toMatchObject({ inForce: true, can: { withdraw: true } })
    expect((await withdraw(asMother, seen?.consentId ?? '')).status).toBe(204)
  })

  it('is refused to a carer without it, except for what is theirs', async () => {
    await database().manager.update(Guardian, { id: motherRow.id }, { parentalResponsibility: 'no' })
    const general = await giveConsent(child, 'assessment_treatment', therapist)
    const mail = await giveConsent(child, 'email_link', therapist, { guardianId: motherRow.id })
    expect(await consentSeenBy(asMother, 'assessment_treatment')).toMatchObject({
      inForce: true,
      consentId: null,
      can: { withdraw: false },
    })
    expect((await withdraw(asMother, general.id)).status).toBe(403)
    expect((await withdraw(asMother, mail.id)).status).toBe(204)
  })

  it('does not reach the other carer’s e-mail choice, another child’s consent or an id that is none', async () => {
    const fathers = await giveConsent(child, 'email_link', therapist, { guardianId: fatherRow.id })
    const strange = await giveConsent(await buildChild({ therapist }), 'video', therapist)
    for (const id of [fathers.id, strange.id, randomUUID(), 'x'])
      expect((await withdraw(asMother, id)).status).toBe(404)
    expect(await database().manager.countBy(Consent, { kind: 'withdrawn', withdrawsId: fathers.id })).toBe(0)
    expect(await database().manager.countBy(Consent, { kind: 'withdrawn', withdrawsId: strange.id })).toBe(0)
  })
})

describe('a link that does not count', () => {
  const everywhere = async (as: Client) => {
    const consent = await giveConsent(child, 'video', therapist)
    const answers = [
      await as.get(at()),
      await as.put(at('/contact')).set('If-Match', '"1"').send(fathersOwn),
      await as.post(at('/consents')).send({ purpose: 'teaching_use' }),
      await as.post(at(`/consents/${consent.id}/withdraw`)).send({ reason: null }),
    ]
    return answers.map((answer) => ({ ...answer.body, status: answer.status, requestId: '' }))
  }

  it.each<[string, Partial<Guardian>]>([
    ['restricted', { restricted: true }],
    ['ended', { endedAt: new Date(Date.now() - 1000) }],
    ['unverified', { verifiedAt: null }],
  ])('(%s) opens nothing: the answers are those of a child who does not exist', async (_what, change) => {
    await database().manager.update(Guardian, { id: fatherRow.id }, change)
    const refused = await everywhere(asFather)
    expect(refused.map(({ status }) => status)).toEqual([404, 404, 404, 404])
    expect((await asFather.get('/api/my/children')).text).not.toContain(child.id)
    const real = child
    child = { ...child, id: randomUUID() }
    const absent = [
      await asFather.get(at()),
      await asFather.put(at('/contact')).set('If-Match', '"1"').send(fathersOwn),
      await asFather.post(at('/consents')).send({ purpose: 'teaching_use' }),
      await asFather.post(at(`/consents/${randomUUID()}/withdraw`)).send({ reason: null }),
    ].map((answer) => ({ ...answer.body, status: answer.status, requestId: '' }))
    child = real
    expect(refused).toEqual(absent)
    expect(await rowOf(fatherRow)).toMatchObject(fathersOwn)
    expect((await consentRows()).map((row) => row.purpose)).toEqual(['video'])
  })

  it('(restricted) beats a second link of the same person that is not', async () => {
    await buildGuardian(child, father, { relation: 'other', restricted: true })
    expect((await asFather.get(at())).status).toBe(404)
    expect((await asFather.get('/api/my/children')).text).not.toContain(child.id)
    expect((await asMother.get(at())).status).toBe(200)
  })

  // Eighteen completed years; born on 29 February, the day after 28 February of a common year.
  it.each([
    ['2010-07-01', '2028-06-30T23:59:00Z', 200],
    ['2010-07-01', '2028-07-01T00:00:00Z', 404],
    ['2008-02-29', '2026-02-28T23:59:00Z', 200],
    ['2008-02-29', '2026-03-01T00:00:00Z', 404],
  ])('(the child, born %s, at %s) answers a carer %i', async (birthDate, moment, status) => {
    setClock(() => new Date(moment))
    child = await buildChild({ therapist, birthDate })
    await buildGuardian(child, mother)
    const young = await buildUser('guardian')
    await buildGuardian(child, young, { relation: 'self' })
    expect((await (await signedInAs(mother)).get(at())).status).toBe(status)
    expect((await (await signedInAs(young)).get(at())).status).toBe(200)
  })

  it('opens again on the next request once a restriction is lifted', async () => {
    await database().manager.update(Guardian, { id: fatherRow.id }, { restricted: true })
    expect((await asFather.get(at())).status).toBe(404)
    await database().manager.update(Guardian, { id: fatherRow.id }, { restricted: false })
    expect((await asFather.get(at())).status).toBe(200)
  })
})

describe('a person with two hats', () => {
  it('meets their own child as family only, and the entry says so', async () => {
    const both = await buildUser('therapist', { roles: ['therapist', 'clinicLead', 'guardian'] })
    child = await buildChild({ therapist: both })
    await buildGuardian(child, both)
    const as = await signedInAs(both)
    expect((await as.get(at())).status).toBe(200)
    expect((await as.get(`/api/children/${child.id}/letters`)).status).toBe(404)
    const entries = await database().query(
      "SELECT DISTINCT relation FROM audit_entries WHERE childId = ? AND action = 'family.child'",
      [child.id],
    )
    expect(entries).toEqual([{ relation: 'guardian' }])
  })
})
