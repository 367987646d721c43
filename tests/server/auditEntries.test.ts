import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { AccessPage } from '../../shared/auditEntries.ts'
import type { Child } from '../../server/entities/Child.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'

let child: Child
let therapist: Client
let lead: Client
let administrator: Client
let mother: Client
let fatherName: string

beforeAll(async () => {
  await startApp()
  const holder = await buildUser('therapist', { displayName: 'Hedda Holder' })
  const leadUser = await buildUser('clinicLead', { displayName: 'Lida Lead' })
  child = await buildChild({ therapist: holder })
  const motherUser = await buildUser('guardian', { displayName: 'Mira Mother' })
  const fatherUser = await buildUser('guardian', { displayName: 'Falk Father' })
  fatherName = fatherUser.displayName
  await buildGuardian(child, motherUser)
  const father = await buildGuardian(child, fatherUser, { relation: 'father' })
  therapist = await signedInAs(holder)
  lead = await signedInAs(leadUser)
  administrator = await signedInAs(await buildUser('administrator', { displayName: 'Olga Office' }))
  mother = await signedInAs(motherUser)
  const asFather = await signedInAs(fatherUser)

  await therapist.get(`/api/children/${child.id}/glance`)
  await administrator.get(`/api/children/${child.id}/glance`)
  const other = await signedInAs(await buildUser('therapist', { displayName: 'Otto Other' }))
  await other.get(`/api/children/${child.id}`)
  await lead
    .post(`/api/children/${child.id}/state`)
    .set('If-Match', '"1"')
    .send({ to: 'discharged', reason: 'Goals met' })
  await mother.get(`/api/my/children/${child.id}`)
  await asFather.get(`/api/my/children/${child.id}`)
  await therapist
    .post(`/api/children/${child.id}/guardians/${father.id}/restrict`)
    .send({ restricted: true, reason: 'Court order' })
})
afterAll(stopApp)

const history = async (who: Client, query = '') =>
  (await who.get(`/api/children/${child.id}/access-history${query}`)).body as AccessPage

describe('the access history', () => {
  it('tells staff who did what as whom, the newest first, refusals too', async () => {
    const { rows } = await history(lead, '?size=100')
    const lines = rows.map((row) => [row.who, row.relation, row.action, row.result].join(' · '))
    expect(lines).toEqual(
      expect.arrayContaining([
        'Hedda Holder · Therapist of the child · Record: at a glance read · allowed',
        'Olga Office · Administrator · Record: glance · denied',
        'Otto Other · Nobody to this child · Record: header · denied',
        'Lida Lead · Clinic lead · Episode: state changed · allowed',
        'Hedda Holder · Therapist of the child · Carer: restricted · allowed',
        'Falk Father · Parent or carer · Family page: read · allowed',
      ]),
    )
    const moments = rows.map((row) => row.at)
    expect(moments).toEqual([...moments].sort().reverse())
  })

  it('pages, and looking at it is itself an entry', async () => {
    const first = await history(lead, '?size=2')
    expect(first.rows).toHaveLength(2)
    const again = await history(lead, '?size=2')
    expect(again.total).toBe(first.total + 1)
    expect(again.rows[0]?.action).toBe('Access history: read')
    const second = await history(lead, '?size=2&page=2')
    expect(second.rows.map((row) => row.id)).not.toContain(again.rows[0]?.id)
  })

  it('tells a carer as whom and when, but no names, no other carer and no restriction', async () => {
    const answer = await mother.get(`/api/children/${child.id}/access-history?size=100`)
    const { rows } = answer.body as AccessPage
    expect(rows.length).toBeGreaterThan(2)
    for (const name of ['Hedda', 'Lida', 'Olga', 'Otto', fatherName, 'estrict'])
      expect(answer.text).not.toContain(name)
    expect(new Set(rows.map((row) => row.action))).toEqual(new Set(['Read', 'Written']))
    expect(rows.some((row) => row.who === 'Mira Mother' && row.action === 'Read')).toBe(true)
    expect(rows.every((row) => row.result === 'allowed')).toBe(true)
  })

  it('is closed to the office (403), other therapists and teachers (404)', async () => {
    const teacher = await buildUser('teacher')
    const schoolClass = await buildClass(teacher)
    const pupil = await buildChild({ schoolClassId: schoolClass.id })
    await giveConsent(pupil, 'share_school_seating', await buildUser('clinicLead'))
    const path = (id: string) => `/api/children/${id}/access-history`
    expect((await administrator.get(path(child.id))).status).toBe(403)
    expect((await (await signedInAs(teacher)).get(path(pupil.id))).status).toBe(404)
    expect((await (await signedInAs(await buildUser('therapist'))).get(path(child.id))).status).toBe(404)
    expect((await client().get(path(child.id))).status).toBe(401)
  })
})
