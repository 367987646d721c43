import { randomUUID } from 'node:crypto'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Guardian } from '../../server/entities/Guardian.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import {
  consentRows,
  familyScene,
  fathersOwn,
  guardianRow,
  ownChildPath,
  type FamilyScene,
} from '../support/family.ts'

beforeAll(startApp)
afterAll(stopApp)
afterEach(() => setClock(() => new Date()))

let therapist: FamilyScene['therapist']
let mother: FamilyScene['mother']
let father: FamilyScene['father']
let child: FamilyScene['child']
let fatherRow: FamilyScene['fatherRow']
let asMother: FamilyScene['asMother']
let asFather: FamilyScene['asFather']

beforeEach(async () => {
  ;({ therapist, mother, father, child, fatherRow, asMother, asFather } = await familyScene())
})

const at = (path = '', of: Pick<Child, 'id'> = child) => ownChildPath(of, path)

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
    expect(await guardianRow(fatherRow)).toMatchObject(fathersOwn)
    expect((await consentRows(child)).map((row) => row.purpose)).toEqual(['video'])
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
