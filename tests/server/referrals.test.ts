import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { ReferralRow } from '../../shared/referrals.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildClass, buildUser } from '../support/factories.ts'
import { carerDetails, enterReferral, referralDetails } from '../support/referrals.ts'

let administrator: Client
let lead: Client
let therapist: Client

beforeAll(async () => {
  await startApp()
  administrator = await signedInAs(await buildUser('administrator'))
  lead = await signedInAs(await buildUser('clinicLead'))
  therapist = await signedInAs(await buildUser('therapist'))
})
afterAll(stopApp)

const rowsOf = async (who: Client, query = '') =>
  (await who.get(`/api/referrals${query}`)).body.rows as ReferralRow[]

describe('entering a referral', () => {
  it('keeps it whole, says what is missing, and opens it again as it was typed', async () => {
    const schoolClass = await buildClass()
    const entered = await enterReferral(administrator, {
      familyName: 'Entered',
      preferredName: 'Otti',
      classId: schoolClass.id,
      carers: [carerDetails(), carerDetails({ name: 'Zoë Ångström 🖐', relation: 'grandparent' })],
    })
    expect(entered).toMatchObject({ status: 'new', missing: [], version: 1, childId: null })
    expect(entered.can).toEqual({ change: true, accept: false, decline: false, allocate: false })
    const seen = (await lead.get(`/api/referrals/${entered.id}`)).body
    expect(seen.carers[1].name).toBe('Zoë Ångström 🖐')
    expect(seen).toMatchObject({ preferredName: 'Otti', classId: schoolClass.id })
    expect(seen.className).toMatch(/^Class /)
    expect(seen.can).toEqual({ change: true, accept: true, decline: true, allocate: true })
  })

  it('puts a referral without a carer who may decide, or without a school, into the incomplete queue', async () => {
    const entered = await enterReferral(administrator, {
      familyName: 'Incomplete',
      schoolNote: null,
      carers: [carerDetails({ parentalResponsibility: 'unknown' })],
    })
    expect(entered.status).toBe('incomplete')
    expect(entered.missing).toEqual(['nobody with parental responsibility is named', 'no school is named'])

    const completed = await administrator
      .put(`/api/referrals/${entered.id}`)
      .set('If-Match', '"1"')
      .send(referralDetails({ familyName: 'Incomplete' }))
    expect(completed.body).toMatchObject({ status: 'new', missing: [], version: 2 })
  })

  it('keeps one referral when the same form arrives twice', async () => {
    const key = randomUUID()
    const send = () =>
      administrator
        .post('/api/referrals')
        .set('Idempotency-Key', key)
        .send(referralDetails({ familyName: 'Twice' }))
    const [first, second] = await Promise.all([send(), send()])
    expect(first.body.id).toBe(second.body.id)
    expect(await rowsOf(administrator, '?search=Twice')).toHaveLength(1)
  })

  it.each([
    ['a birth date in the future', { birthDate: '2030-01-01' }, 'birthDate'],
    ['a birth date before the century', { birthDate: '1908-05-04' }, 'birthDate'],
    ['no such day', { birthDate: '2019-02-29' }, 'birthDate'],
    ['a day received in the future', { receivedOn: '2199-01-01' }, 'receivedOn'],
    ['a short reason', { reason: 'Messy writing' }, 'reason'],
    ['a class nobody entered', { classId: randomUUID() }, 'classId'],
    ['two mailboxes in one', { referrerEmail: 'a@b.example, c@d.example' }, 'referrerEmail'],
    ['a line break in an address', { referrerEmail: 'a@b.example\r\nBcc: x@y.example' }, 'referrerEmail'],
    ['an unknown concern', { concerns: ['laziness'] }, 'concerns[0]'],
    ['no concern', { concerns: [] }, 'concerns'],
    [
      'a carer without a relation',
      { carers: [{ ...carerDetails(), relation: undefined }] },
      'carers[0].relation',
    ],
    ['a yes as text', { lookedAfter: 'true' }, 'lookedAfter'],
  ])('refuses %s beside the field', async (_what, given, field) => {
    const response = await administrator
      .post('/api/referrals')
      .send({ ...referralDetails({ familyName: 'Refused' }), ...given })
    expect([response.status, Object.keys(response.body.fields ?? {})]).toEqual([422, [field]])
    expect(await rowsOf(administrator, '?search=Refused')).toEqual([])
  })

  it('refuses fields that are not asked for', async () => {
    const response = await administrator
      .post('/api/referrals')
      .send({ ...referralDetails(), status: 'accepted' })
    expect(response.status).toBe(422)
  })

  it('keeps both texts when two people change it at once', async () => {
    const entered = await enterReferral(administrator, { familyName: 'Contested' })
    const save = (who: Client, referrerName: string) =>
      who
        .put(`/api/referrals/${entered.id}`)
        .set('If-Match', '"1"')
        .send(referralDetails({ familyName: 'Contested', referrerName }))
    expect((await save(lead, 'From the lead')).status).toBe(200)
    const late = await save(administrator, 'From the office')
    expect([late.status, late.body.code]).toEqual([409, 'stale'])
    expect(late.body.current).toMatchObject({ referrerName: 'From the lead', version: 2 })
    const blind = await administrator
      .put(`/api/referrals/${entered.id}`)
      .send(referralDetails({ familyName: 'Contested' }))
    expect(blind.status).toBe(428)
  })
})

describe('the list of referrals', () => {
  it('shows names to the office, and to a therapist the queue by age band only', async () => {
    await enterReferral(administrator, { familyName: 'Unnamed', birthDate: '2019-01-15' })
    const [office] = await rowsOf(administrator, '?search=unnamed')
    expect(office).toMatchObject({ childName: 'Ottoline Unnamed', birthDate: '2019-01-15' })

    const answer = await therapist.get('/api/referrals?size=100')
    const queued = (answer.body.rows as ReferralRow[]).filter((row) => row.receivedOn === '2026-11-02')
    expect(queued.length).toBeGreaterThan(0)
    for (const row of queued) {
      expect([row.childName, row.birthDate, row.school]).toEqual([null, null, null])
      expect(row.ageBand).toMatch(/years$/)
      expect(row.concerns).toEqual(['handwriting', 'speed'])
    }
    expect(JSON.stringify(answer.body)).not.toContain('Unnamed')
    // A search that would find by name finds nothing, so the queue cannot be asked whether a child is in it.
    expect(await rowsOf(therapist, '?search=Unnamed')).toEqual([])
  })

  it('sorts, filters and pages on the server, in the order asked for', async () => {
    for (const [index, givenName] of ['Cleo', 'Abel', 'Bram'].entries())
      await enterReferral(administrator, {
        givenName,
        familyName: 'Sorted',
        receivedOn: `2026-10-0${index + 1}`,
      })
    const names = async (query: string) =>
      (await rowsOf(administrator, `?search=Sorted&${query}`)).map((row) => row.childName?.split(' ')[0])
    expect(await names('sort=childName&direction=asc')).toEqual(['Abel', 'Bram', 'Cleo'])
    expect(await names('sort=receivedOn&direction=asc')).toEqual(['Cleo', 'Abel', 'Bram'])
    expect(await names('sort=childName&direction=desc&size=1&page=2')).toEqual(['Bram'])
    expect(await names('status=declined')).toEqual([])
    const answer = await administrator.get('/api/referrals?sort=reason,sleep(1)')
    expect([answer.status, Object.keys(answer.body.fields)]).toEqual([422, ['sort']])
  })
})

describe('possible duplicates', () => {
  it('are offered for the same name and birth date, whatever the case and accents', async () => {
    const known = await buildChild({
      givenName: 'Zoë',
      familyName: 'Møller-Lund',
      birthDate: '2018-03-09',
      recordNumber: 'FF-2020-0001',
    })
    await enterReferral(administrator, {
      givenName: 'Zoe',
      familyName: 'Møller-Lund',
      birthDate: '2018-03-09',
    })
    const ask = (query: object) => administrator.get('/api/referrals/duplicates').query(query)
    const found = await ask({ givenName: 'ZOE', familyName: 'møller-lund', birthDate: '2018-03-09' })
    expect(found.body).toEqual([
      {
        kind: 'child',
        id: known.id,
        recordNumber: 'FF-2020-0001',
        name: 'Zoë Møller-Lund',
        birthDate: '2018-03-09',
        status: 'On the register',
      },
      expect.objectContaining({ kind: 'referral', status: 'To be looked at' }),
    ])
    expect(
      (await ask({ givenName: 'Zoe', familyName: 'Møller-Lund', birthDate: '2018-03-10' })).body,
    ).toEqual([])
    const bad = await ask({ givenName: 'Zoe', birthDate: 'tomorrow' })
    expect([bad.status, Object.keys(bad.body.fields).sort()]).toEqual([422, ['birthDate', 'familyName']])
  })

  it('cannot be asked for by a therapist, who would learn who is known here', async () => {
    const answer = await therapist
      .get('/api/referrals/duplicates')
      .query({ givenName: 'Zoe', familyName: 'Møller-Lund', birthDate: '2018-03-09' })
    expect(answer.status).toBe(403)
  })
})

describe('declining', () => {
  const decline = (who: Client, id: string, version = 1) =>
    who.post(`/api/referrals/${id}/decline`).set('If-Match', `"${version}"`).send({
      outcome: 'advice_only',
      reason: 'Advice for school answers the question.',
    })

  it('is the lead’s, keeps outcome and reason, and closes the referral', async () => {
    const entered = await enterReferral(administrator, { familyName: 'Declined' })
    expect((await decline(therapist, entered.id)).status).toBe(403)
    expect((await decline(administrator, entered.id)).status).toBe(403)

    const done = await decline(lead, entered.id)
    expect(done.body).toMatchObject({
      status: 'declined',
      outcome: 'advice_only',
      decisionReason: 'Advice for school answers the question.',
      can: { change: false, accept: false, decline: false },
    })
    const again = await decline(lead, entered.id, 2)
    expect([again.status, again.body.code]).toEqual([409, 'closed'])
    const change = await administrator
      .put(`/api/referrals/${entered.id}`)
      .set('If-Match', '"2"')
      .send(referralDetails())
    expect([change.status, change.body.code]).toEqual([409, 'closed'])
    // Decided and not theirs: for a therapist it is as if it were not there.
    expect((await therapist.get(`/api/referrals/${entered.id}`)).status).toBe(404)
  })
})

describe('who is kept out', () => {
  it('of referrals: parents and teachers 403, strangers 401, an absent one 404', async () => {
    const entered = await enterReferral(administrator, { familyName: 'Closed' })
    for (const role of ['guardian', 'teacher'] as const) {
      const other = await signedInAs(await buildUser(role))
      expect((await other.get('/api/referrals')).status).toBe(403)
      expect((await other.get(`/api/referrals/${entered.id}`)).status).toBe(403)
      expect((await other.post('/api/referrals').send(referralDetails())).status).toBe(403)
    }
    expect((await therapist.post('/api/referrals').send(referralDetails())).status).toBe(403)
    expect((await client().get('/api/referrals')).status).toBe(401)
    expect((await lead.get(`/api/referrals/${randomUUID()}`)).status).toBe(404)
    expect((await lead.get('/api/referrals/1')).status).toBe(404)
  })
})
