import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Consent } from '../../server/entities/Consent.ts'
import { Guardian } from '../../server/entities/Guardian.ts'
import { Task } from '../../server/entities/Task.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { consentRows, consentSeen, familyScene, ownChildPath, type FamilyScene } from '../support/family.ts'

beforeAll(startApp)
afterAll(stopApp)

let therapist: FamilyScene['therapist']
let mother: FamilyScene['mother']
let child: FamilyScene['child']
let motherRow: FamilyScene['motherRow']
let fatherRow: FamilyScene['fatherRow']
let asMother: FamilyScene['asMother']
let asFather: FamilyScene['asFather']

beforeEach(async () => {
  ;({ therapist, mother, child, motherRow, fatherRow, asMother, asFather } = await familyScene())
})

const at = (path = '', of: Pick<Child, 'id'> = child) => ownChildPath(of, path)
const give = (as: Client, purpose: string) => as.post(at('/consents')).send({ purpose })
const withdraw = (as: Client, consentId: string, reason: string | null = null) =>
  as.post(at(`/consents/${consentId}/withdraw`)).send({ reason })

describe('agreeing', () => {
  it('adds a consent in force, given signed in by this carer', async () => {
    expect((await give(asMother, 'share_school_seating')).status).toBe(204)
    const [row, ...more] = await consentRows(child)
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
    expect(await consentSeen(asMother, child, 'share_school_seating')).toMatchObject({
      inForce: true,
      consentId: row?.id,
      givenBy: 'Mira Solberg',
      can: { give: false, withdraw: true },
    })
  })

  it('to e-mail binds it to this carer: for the other nothing changes', async () => {
    await give(asMother, 'email_attachment')
    expect((await consentRows(child))[0]?.guardianId).toBe(motherRow.id)
    expect(await consentSeen(asFather, child, 'email_attachment')).toMatchObject({
      inForce: false,
      can: { give: true, withdraw: false },
    })
  })

  it.each(['no', 'unknown'] as const)(
    'needs parental responsibility: "%s" is refused and adds nothing',
    async (parentalResponsibility) => {
      await database().manager.update(Guardian, { id: motherRow.id }, { parentalResponsibility })
      expect(await consentSeen(asMother, child, 'video')).toMatchObject({
        can: { give: false, withdraw: false },
      })
      expect((await give(asMother, 'video')).status).toBe(403)
      expect(await consentRows(child)).toEqual([])
    },
  )

  it('twice says so and adds nothing, also when both clicks arrive together', async () => {
    const both = await Promise.all([give(asMother, 'video'), give(asMother, 'video')])
    expect(both.map(({ status }) => status).toSorted()).toEqual([204, 409])
    expect((await give(asMother, 'video')).body.code).toBe('duplicate')
    expect(await consentRows(child)).toHaveLength(1)
  })

  it('sent again under the same key answers as before, with one consent', async () => {
    const key = randomUUID()
    const send = () =>
      asMother.post(at('/consents')).set('Idempotency-Key', key).send({ purpose: 'teaching_use' })
    expect([(await send()).status, (await send()).status]).toEqual([204, 204])
    expect(await consentRows(child)).toHaveLength(1)
  })

  it.each([
    ['a purpose nobody knows', { purpose: 'everything' }, 'purpose'],
    ['a carer named in the form', { purpose: 'video', guardianId: randomUUID() }, 'form'],
  ])('refuses %s', async (_what, body, field) => {
    const response = await asMother.post(at('/consents')).send(body)
    expect([response.status, Object.keys(response.body.fields)]).toEqual([422, [field]])
    expect(await consentRows(child)).toEqual([])
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
    const [given] = await consentRows(child)
    expect((await withdraw(asMother, given?.id ?? '', 'We have moved')).status).toBe(204)
    const [kept, ended] = await consentRows(child)
    expect(kept).toEqual(given)
    expect(ended).toMatchObject({
      kind: 'withdrawn',
      withdrawsId: given?.id,
      purpose: 'share_school_seating',
      reason: 'We have moved',
      method: 'signed_in',
      givenByName: 'Mira Solberg',
    })
    expect(await consentSeen(asMother, child, 'share_school_seating')).toMatchObject({
      inForce: false,
      can: { give: true, withdraw: false },
    })
    const tasks = await database().manager.findBy(Task, { childId: child.id })
    expect(tasks).toMatchObject([{ kind: 'consent_withdrawn', assigneeId: therapist.id, doneAt: null }])
    expect(tasks[0]?.text).not.toContain('Mira')
  })

  it('needs no reason', async () => {
    await give(asMother, 'video')
    const [given] = await consentRows(child)
    expect((await withdraw(asMother, given?.id ?? '', '')).status).toBe(204)
    expect((await consentRows(child))[1]?.reason).toBeNull()
  })

  it('goes to the lead as a task when no therapist holds the child', async () => {
    child = await buildChild()
    await buildGuardian(child, mother)
    await give(asMother, 'video')
    const [given] = await consentRows(child)
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
    expect(await consentRows(child)).toHaveLength(3)
  })

  it('is open to each person with parental responsibility, whoever agreed', async () => {
    await give(asFather, 'share_doctor')
    const seen = await consentSeen(asMother, child, 'share_doctor')
    expect(seen).toMatchObject({ inForce: true, can: { withdraw: true } })
    expect((await withdraw(asMother, seen?.consentId ?? '')).status).toBe(204)
  })

  it('is refused to a carer without it, except for what is theirs', async () => {
    await database().manager.update(Guardian, { id: motherRow.id }, { parentalResponsibility: 'no' })
    const general = await giveConsent(child, 'assessment_treatment', therapist)
    const mail = await giveConsent(child, 'email_link', therapist, { guardianId: motherRow.id })
    expect(await consentSeen(asMother, child, 'assessment_treatment')).toMatchObject({
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
