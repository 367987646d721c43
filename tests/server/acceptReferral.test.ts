import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { count, selectOne, selectRows } from '../../server/queries/sql.ts'
import type { User } from '../../server/entities/User.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildUser } from '../support/factories.ts'
import { accept, carerDetails, enterReferral } from '../support/referrals.ts'

let administrator: Client
let lead: Client
let therapist: Client
let colleague: User
const consent = {
  purpose: 'assessment_treatment',
  carer: '0',
  basis: 'parental_responsibility',
  method: 'in_person',
  expiresOn: null,
} as const

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

describe('accepting a referral', () => {
  it('makes child, carers, episode with its history, consents and the hold of the therapist who takes it', async () => {
    const referral = await enterReferral(administrator, {
      familyName: 'Accepted',
      interpreterLanguage: 'Polish',
      carers: [
        carerDetails(),
        carerDetails({ name: 'Piet Quayle', relation: 'father', email: 'piet@quayle.example' }),
      ],
    })
    const accepted = await accept(therapist, referral, {
      therapistId: therapist.userId,
      consents: [
        consent,
        { ...consent, purpose: 'email_link', carer: '1', method: 'paper', expiresOn: '2027-12-31' },
      ],
    })
    expect(accepted.status).toBe(200)
    const { childId } = accepted.body as { childId: string }

    const child = await selectOne('SELECT * FROM children WHERE id = :childId', { childId })
    expect(child).toMatchObject({ familyName: 'Accepted', interpreterLanguage: 'Polish' })
    expect((child as { recordNumber: string }).recordNumber).toMatch(/^FF-2026-\d{4}$/)
    const carers = await rowsFor(childId, 'guardians', 'id, name, parentalResponsibility, userId')
    expect(carers).toHaveLength(2)
    expect(carers.every((carer) => carer.userId === null)).toBe(true)
    const father = carers.find((carer) => carer.name === 'Piet Quayle')
    expect(await rowsFor(childId, 'episodes', 'state, receivedOn, priority')).toEqual([
      { state: 'consented', receivedOn: '2026-11-02', priority: 'routine' },
    ])
    const changes = await selectRows(
      `SELECT x.fromState, x.toState FROM episode_changes x JOIN episodes e ON e.id = x.episodeId
       WHERE e.childId = :childId ORDER BY x.at`,
      { childId },
    )
    expect(changes).toEqual([
      { fromState: null, toState: 'referred' },
      { fromState: 'referred', toState: 'triaged' },
      { fromState: 'triaged', toState: 'consented' },
    ])
    const consents = await rowsFor(childId, 'consents', 'purpose, guardianId, givenByName, kind, expiresAt')
    expect(consents).toHaveLength(2)
    // The clinic's zone is Europe/London: the last day ends at midnight there.
    expect(consents).toContainEqual({
      purpose: 'email_link',
      guardianId: father?.id,
      givenByName: 'Piet Quayle',
      kind: 'given',
      expiresAt: new Date('2028-01-01T00:00:00Z'),
    })
    expect(await rowsFor(childId, 'assignments', 'therapistId, endedAt')).toEqual([
      { therapistId: therapist.userId, endedAt: null },
    ])
    const after = (await therapist.get(`/api/referrals/${referral.id}`)).body
    expect(after).toMatchObject({ status: 'accepted', childId, recordNumber: expect.any(String) })
    const actions = await rowsFor(childId, 'audit_entries', 'action, actorId')
    expect(actions.map((entry) => entry.action)).toEqual(
      expect.arrayContaining(['child.created', 'consent.given', 'child.allocated', 'referral.accepted']),
    )
  })

  it('leaves the child waiting without therapist when none is chosen, and numbers records in a row', async () => {
    const numbers: string[] = []
    for (const familyName of ['Row One', 'Row Two']) {
      const referral = await enterReferral(administrator, { familyName, receivedOn: '2025-12-30' })
      const { childId } = (await accept(therapist, referral, { consents: [consent] })).body
      const child = await selectOne<{ recordNumber: string; state: string }>(
        'SELECT c.recordNumber, e.state FROM children c JOIN episodes e ON e.childId = c.id WHERE c.id = :childId',
        { childId },
      )
      expect(child?.state).toBe('waiting')
      expect(await rowsFor(childId, 'assignments', 'id')).toEqual([])
      numbers.push(child?.recordNumber ?? '')
    }
    expect(numbers).toEqual(['FF-2025-0001', 'FF-2025-0002'])
  })

  it('gives the case to anybody when the lead decides, and to nobody else when a therapist does', async () => {
    const referral = await enterReferral(administrator, { familyName: 'Allocated' })
    const refused = await accept(therapist, referral, { therapistId: colleague.id })
    expect([refused.status, Object.keys(refused.body.fields)]).toEqual([422, ['therapistId']])
    const parent = await buildUser('guardian')
    expect((await accept(lead, referral, { therapistId: parent.id })).body.fields).toHaveProperty(
      'therapistId',
    )
    expect(await childrenCalled('Allocated')).toBe(0)

    const { childId } = (await accept(lead, referral, { therapistId: colleague.id })).body
    expect(await rowsFor(childId, 'assignments', 'therapistId')).toEqual([{ therapistId: colleague.id }])
  })

  it('makes one child when the button is pressed twice or two people press it', async () => {
    const referral = await enterReferral(administrator, { familyName: 'Pressed Twice' })
    const answers = await Promise.all([
      accept(lead, referral),
      accept(therapist, referral),
      accept(lead, referral),
    ])
    const refused = answers.map((answer) => answer.status).filter((status) => status !== 200)
    expect(refused).toHaveLength(2)
    // To a therapist who came second a referral decided by somebody else is no longer theirs to know.
    for (const status of refused) expect([404, 409]).toContain(status)
    expect(await childrenCalled('Pressed Twice')).toBe(1)
  })

  it('is refused to administrators, and when the referral is incomplete', async () => {
    const referral = await enterReferral(administrator, { familyName: 'Not Yet', carers: [] })
    expect((await accept(administrator, referral)).status).toBe(403)
    const answer = await accept(lead, referral)
    expect([answer.status, answer.body.fields.form]).toEqual([
      422,
      expect.stringContaining('no carer is named'),
    ])
  })
})

describe('consents given with the acceptance', () => {
  it.each([
    ['from a carer whose responsibility is not known', { carer: '1' }, 'carer'],
    ['from a carer without responsibility', { carer: '2' }, 'carer'],
    ['from a carer who is not named', { carer: '5' }, 'carer'],
    ['by e-mail to a carer without address', { carer: '2', basis: 'other', purpose: 'email_link' }, 'carer'],
    ['already over', { expiresOn: '2020-01-01' }, 'expiresOn'],
    ['as if the carer had signed in', { method: 'signed_in' }, 'method'],
  ])('are refused %s, and nothing is made', async (_what, given, field) => {
    const familyName = `Consents ${_what}`.slice(0, 40)
    const referral = await enterReferral(administrator, {
      familyName,
      carers: [
        carerDetails(),
        carerDetails({ name: 'Gran Unsure', parentalResponsibility: 'unknown' }),
        carerDetails({ name: 'Uncle Without', parentalResponsibility: 'no', email: null }),
      ],
    })
    const answer = await accept(lead, referral, { consents: [{ ...consent, ...given } as typeof consent] })
    expect([answer.status, Object.keys(answer.body.fields)]).toEqual([422, [`consents[0].${field}`]])
    expect(await childrenCalled(familyName)).toBe(0)
  })

  it('are accepted from a carer without responsibility on a court order', async () => {
    const referral = await enterReferral(administrator, {
      familyName: 'Court',
      carers: [carerDetails(), carerDetails({ name: 'Foster Carer', parentalResponsibility: 'no' })],
    })
    const answer = await accept(lead, referral, {
      consents: [{ ...consent, carer: '1', basis: 'court_order' }],
    })
    expect(answer.status).toBe(200)
  })
})

describe('warning signs in a referral', () => {
  const reason = 'Has used the left hand only since 8 months, and the right hand is often fisted.'

  it('stop a therapist’s routine place, and stand on the record with a task when it is given priority', async () => {
    const referral = await enterReferral(administrator, { familyName: 'Flagged', reason })
    const routine = await accept(therapist, referral, { priorityReason: 'Seems well' })
    expect([routine.status, Object.keys(routine.body.fields)]).toEqual([422, ['priority']])
    const silent = await accept(therapist, referral, { priority: 'priority' })
    expect(Object.keys(silent.body.fields)).toEqual(['priorityReason'])

    const answer = await accept(therapist, referral, {
      priority: 'priority',
      priorityReason: 'Medical review first',
      therapistId: therapist.userId,
    })
    const { childId } = answer.body
    const alerts = await rowsFor(childId, 'alerts', 'flag, level, actedAt')
    expect(alerts).toContainEqual({ flag: 'other-hand-or-lost-skill', level: 'overdue', actedAt: null })
    const tasks = await rowsFor(childId, 'tasks', 'kind, assigneeId, forRole')
    expect(tasks).toContainEqual({ kind: 'red_flag', assigneeId: therapist.userId, forRole: null })
  })

  it('let the lead decide on routine with a reason; without therapist the lead gets the task', async () => {
    const referral = await enterReferral(administrator, { familyName: 'Lead Decides', reason })
    expect(Object.keys((await accept(lead, referral)).body.fields)).toEqual(['priorityReason'])
    const { childId } = (await accept(lead, referral, { priorityReason: 'Doctor has seen the child' })).body
    expect(await rowsFor(childId, 'tasks', 'assigneeId, forRole')).toContainEqual({
      assigneeId: null,
      forRole: 'clinicLead',
    })
  })
})
