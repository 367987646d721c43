import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { consentPurposes } from '../../shared/consents.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Goal } from '../../server/entities/Goal.ts'
import { Guardian } from '../../server/entities/Guardian.ts'
import { signedInAs, startApp, stopApp } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import {
  consentSeen,
  familyScene,
  fathersOwn,
  guardianRow,
  mothersOwn,
  ownChildPath,
  ownChildSeen,
  type FamilyScene,
} from '../support/family.ts'

beforeAll(startApp)
afterAll(stopApp)

let therapist: FamilyScene['therapist']
let mother: FamilyScene['mother']
let father: FamilyScene['father']
let child: FamilyScene['child']
let motherRow: FamilyScene['motherRow']
let fatherRow: FamilyScene['fatherRow']
let asMother: FamilyScene['asMother']
let asFather: FamilyScene['asFather']

beforeEach(async () => {
  ;({ therapist, mother, father, child, motherRow, fatherRow, asMother, asFather } = await familyScene())
})

const at = (path = '', of: Pick<Child, 'id'> = child) => ownChildPath(of, path)

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
    const view = await ownChildSeen(asMother, child)
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
    expect(await consentSeen(asMother, child, 'email_link')).toMatchObject({ inForce: false, givenBy: null })
    expect(await consentSeen(asFather, child, 'email_link')).toMatchObject({
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
    expect(await guardianRow(motherRow)).toMatchObject({ ...next, name: 'Mira Solberg' })
    expect(await guardianRow(fatherRow)).toMatchObject({ ...fathersOwn, version: 1 })
  })

  it('answers a stale save with what is stored, and changes nothing', async () => {
    await asMother.put(at('/contact')).set('If-Match', '"1"').send({ phone: '0161 496 0001', address: null })
    const late = await asMother.put(at('/contact')).set('If-Match', '"1"').send(mothersOwn)
    expect([late.status, late.body.code]).toEqual([409, 'stale'])
    expect(late.body.current).toMatchObject({ phone: '0161 496 0001', address: null, version: 2 })
    expect((await guardianRow(motherRow)).phone).toBe('0161 496 0001')
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
    expect(await guardianRow(motherRow)).toMatchObject({ ...mothersOwn, version: 1 })
  })

  it('needs the version it was made from', async () => {
    expect((await asMother.put(at('/contact')).send(mothersOwn)).status).toBe(428)
  })
})
