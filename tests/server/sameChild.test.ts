import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { count, selectOne, selectRows } from '../../server/queries/sql.ts'
import type { User } from '../../server/entities/User.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser } from '../support/factories.ts'
import { accept, carerDetails, enterReferral } from '../support/referrals.ts'

let administrator: Client
let lead: Client
let therapist: Client
let colleague: User

beforeAll(async () => {
  await startApp()
  administrator = await signedInAs(await buildUser('administrator'))
  lead = await signedInAs(await buildUser('clinicLead'))
  therapist = await signedInAs(await buildUser('therapist'))
  colleague = await buildUser('therapist')
})
afterAll(stopApp)

const rowsFor = (childId: string, table: string, columns: string) =>
  selectRows<Record<string, unknown>>(`SELECT ${columns} FROM ${table} WHERE childId = :childId`, { childId })

const childrenCalled = async (familyName: string) =>
  count(
    (
      await selectOne<{ n: string }>('SELECT COUNT(*) AS n FROM children WHERE familyName = :familyName', {
        familyName,
      })
    )?.n ?? '0',
  )

describe('a child who is known already', () => {
  it('is offered, not created again; a different child is made on request', async () => {
    const known = await buildChild({
      givenName: 'Ottoline',
      familyName: 'Namesake',
      recordNumber: 'FF-2020-0002',
    })
    const referral = await enterReferral(administrator, { familyName: 'Namesake' })
    const answer = await accept(lead, referral)
    expect([answer.status, answer.body.code]).toEqual([409, 'duplicate'])
    expect(answer.body.current).toEqual([
      expect.objectContaining({ id: known.id, recordNumber: 'FF-2020-0002' }),
    ])
    expect(await childrenCalled('Namesake')).toBe(1)

    const other = await accept(lead, referral, { differentChild: true })
    expect(other.status).toBe(200)
    expect(other.body.childId).not.toBe(known.id)
    expect(await childrenCalled('Namesake')).toBe(2)
  })

  it('takes a second referral into the open episode, with the carer who was missing', async () => {
    const known = await buildChild({
      familyName: 'Merged',
      givenName: 'Ottoline',
      therapist: colleague,
      recordNumber: 'FF-2020-0003',
    })
    await buildGuardian(known, null, { name: 'Rosalind Quayle' })
    const referral = await enterReferral(administrator, {
      familyName: 'Merged',
      schoolNote: null,
      carers: [
        carerDetails({ name: 'ROSALIND QUAYLE' }),
        carerDetails({ name: 'Piet Quayle', relation: 'father' }),
      ],
    })
    expect(referral.status).toBe('incomplete')
    const answer = await accept(therapist, referral, { existingChildId: known.id })
    expect(answer.body).toEqual({ childId: known.id })
    expect(await rowsFor(known.id, 'episodes', 'state')).toEqual([{ state: 'active' }])
    const carers = await rowsFor(known.id, 'guardians', 'name')
    expect(carers.map((carer) => carer.name).sort()).toEqual(['Piet Quayle', 'Rosalind Quayle'])
    expect((await lead.get(`/api/referrals/${referral.id}`)).body).toMatchObject({
      status: 'merged',
      childId: known.id,
    })
    // The child stays with the colleague, so the therapist who joined the referral does not see it.
    expect(await rowsFor(known.id, 'assignments', 'therapistId')).toEqual([{ therapistId: colleague.id }])
    expect((await therapist.get(`/api/referrals/${referral.id}`)).status).toBe(404)
  })

  it('gets a new episode when the earlier one was closed', async () => {
    const known = await buildChild({
      familyName: 'Again',
      givenName: 'Ottoline',
      state: 'discharged',
      recordNumber: 'FF-2020-0004',
    })
    const referral = await enterReferral(administrator, { familyName: 'Again' })
    await accept(lead, referral, { existingChildId: known.id, therapistId: colleague.id })
    const states = await rowsFor(known.id, 'episodes', 'state')
    expect(states.map((row) => row.state).sort()).toEqual(['discharged', 'waiting'])
    expect((await lead.get(`/api/referrals/${referral.id}`)).body.status).toBe('accepted')
  })

  it('cannot be named by a therapist who neither holds it nor was shown it', async () => {
    const elsewhere = await buildChild({ familyName: 'Elsewhere', recordNumber: 'FF-2020-0005' })
    const referral = await enterReferral(administrator, { familyName: 'Somebody' })
    const answer = await accept(therapist, referral, { existingChildId: elsewhere.id })
    expect([answer.status, Object.keys(answer.body.fields)]).toEqual([422, ['existingChildId']])
  })
})
