import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { database } from '../../server/dataSource.ts'
import { now } from '../../server/clock.ts'
import { Assignment } from '../../server/entities/Assignment.ts'
import type { User } from '../../server/entities/User.ts'
import { selectOne, selectRows } from '../../server/queries/sql.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { buildTask } from '../support/tasks.ts'

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

describe('what the therapist keeps', () => {
  const save = (who: Client, childId: string, care: object, version: number) =>
    who.patch(`/api/children/${childId}/care`).set('If-Match', `"${version}"`).send(care)
  const care = { writingHand: 'left', nextReviewOn: null, strengths: 'Draws comics\nKind to others' }

  it('is saved with its version; a change of hand stands as a sign with a task', async () => {
    const child = await buildChild({ therapist: holder, writingHand: 'left' })
    expect((await save(therapist, child.id, care, 1)).status).toBe(204)
    const changed = await save(therapist, child.id, { ...care, writingHand: 'right' }, 2)
    expect(changed.status).toBe(204)
    const late = await save(lead, child.id, care, 1)
    expect([late.status, late.body.current]).toEqual([409, { ...care, writingHand: 'right', version: 3 }])

    const glance = (await therapist.get(`/api/children/${child.id}/glance`)).body
    expect(glance.strengths).toBe('Draws comics\nKind to others')
    expect(glance.child.alerts[0].text).toContain('Writing hand recorded as right')
    // Done by writing down what was done about the sign, so there is nothing to tick.
    expect(glance.tasks[0]).toMatchObject({ can: { finish: false } })
    expect(glance.tasks[0].text).toContain('writing hand changed')
  })

  it('takes no review in the past, and not from others', async () => {
    const child = await buildChild({ therapist: holder })
    const past = await save(therapist, child.id, { ...care, nextReviewOn: '2020-01-01' }, 1)
    expect([past.status, Object.keys(past.body.fields)]).toEqual([422, ['nextReviewOn']])
    expect((await save(administrator, child.id, care, 1)).status).toBe(403)
    expect((await save(other, child.id, care, 1)).status).toBe(404)
  })
})

describe('a warning sign', () => {
  it('leaves the head once somebody wrote down what was done, and cannot be answered twice', async () => {
    const child = await buildChild({ therapist: holder, writingHand: 'left' })
    const strange = await buildChild({ therapist: holder })
    await therapist
      .patch(`/api/children/${child.id}/care`)
      .set('If-Match', '"1"')
      .send({ writingHand: 'right', nextReviewOn: null, strengths: null })
    const [alert] = (await therapist.get(`/api/children/${child.id}`)).body.alerts
    const act = (who: Client, childId: string) =>
      who
        .post(`/api/children/${childId}/alerts/${alert.id}/action`)
        .send({ action: 'Family doctor asked today' })
    expect((await act(therapist, strange.id)).status).toBe(404)
    expect((await act(administrator, child.id)).status).toBe(403)
    expect((await act(therapist, child.id)).status).toBe(204)
    expect((await therapist.get(`/api/children/${child.id}`)).body.alerts).toEqual([])
    expect((await act(lead, child.id)).body.code).toBe('closed')
  })
})

describe('the state of an episode', () => {
  const move = (
    who: Client,
    childId: string,
    to: string,
    version = 1,
    reason = 'As agreed with the family',
  ) => who.post(`/api/children/${childId}/state`).set('If-Match', `"${version}"`).send({ to, reason })
  const glance = async (childId: string) => (await therapist.get(`/api/children/${childId}/glance`)).body

  it('moves on step by step with consent; the first assessment ends the wait and therapy sets the next review', async () => {
    const child = await buildChild({ therapist: holder, state: 'waiting' })
    expect((await glance(child.id)).nextStates).toContain('consented')
    const early = await move(therapist, child.id, 'consented')
    expect([early.status, early.body.code]).toEqual([409, 'consent_needed'])
    await giveConsent(child, 'assessment_treatment', holder)
    for (const [index, to] of ['consented', 'assessing', 'formulated', 'active'].entries())
      expect((await move(therapist, child.id, to, index + 1)).status).toBe(204)
    const after = await glance(child.id)
    expect(after.child.state).toBe('active')
    expect(after.history.map((change: { to: string }) => change.to)).toEqual([
      'consented',
      'assessing',
      'formulated',
      'active',
    ])
    expect(after.history[0]).toMatchObject({ by: 'Hedda Holder', reason: 'As agreed with the family' })
    const row = await selectOne(
      `SELECT e.firstSeenOn IS NOT NULL AS seen, DATEDIFF(c.nextReviewOn, CURDATE()) BETWEEN 83 AND 85 AS inTwelveWeeks
       FROM episodes e JOIN children c ON c.id = e.childId WHERE e.childId = :id`,
      { id: child.id },
    )
    expect(row).toEqual({ seen: 1, inTwelveWeeks: 1 })
  })

  it('skips no step, changes once for each version, and stays closed once closed', async () => {
    const child = await buildChild({ therapist: holder, state: 'waiting' })
    await giveConsent(child, 'assessment_treatment', holder)
    const jump = await move(therapist, child.id, 'active')
    expect([jump.status, Object.keys(jump.body.fields)]).toEqual([422, ['to']])
    expect((await move(therapist, child.id, 'consented')).status).toBe(204)
    const late = await move(lead, child.id, 'moved_away')
    expect([late.status, late.body.current]).toEqual([409, { state: 'consented', episodeVersion: 2 }])
    expect((await move(therapist, child.id, 'moved_away', 2)).status).toBe(204)
    const closed = await move(lead, child.id, 'waiting', 3)
    expect([closed.status, closed.body.code]).toEqual([409, 'closed'])
    expect((await glance(child.id)).can.changeState).toBe(false)
  })

  it('is declined by the lead only', async () => {
    const child = await buildChild({ therapist: holder, state: 'waiting' })
    expect((await glance(child.id)).nextStates).not.toContain('declined')
    expect((await move(therapist, child.id, 'declined')).status).toBe(422)
    expect((await move(lead, child.id, 'declined')).status).toBe(204)
  })

  it('is refused to the office (403), to others (404), and without a reason (422)', async () => {
    const child = await buildChild({ therapist: holder, state: 'active' })
    expect((await move(administrator, child.id, 'discharged')).status).toBe(403)
    expect((await move(other, child.id, 'discharged')).status).toBe(404)
    expect((await move(therapist, child.id, 'discharged', 1, '')).body.fields).toHaveProperty('reason')
    expect((await move(therapist, child.id, 'nowhere')).body.fields).toHaveProperty('to')
  })
})

describe('allocation', () => {
  const allocate = (who: Client, childId: string, therapistId: string | null) =>
    who.post(`/api/children/${childId}/allocation`).send({ therapistId, reason: 'Fewer cases' })

  it('ends the earlier hold at once and hands over the open tasks', async () => {
    const child = await buildChild({ therapist: holder })
    const task = await buildTask({ childId: child.id, assigneeId: holder.id })
    expect((await allocate(lead, child.id, colleague.id)).status).toBe(204)
    expect((await therapist.get(`/api/children/${child.id}`)).status).toBe(404)
    expect((await other.get(`/api/children/${child.id}`)).body.therapist).toBe('Colm League')
    expect(await selectOne('SELECT assigneeId FROM tasks WHERE id = :id', { id: task.id })).toEqual({
      assigneeId: colleague.id,
    })
    const holds = await selectRows<{ endReason: string | null }>(
      'SELECT therapistId, endReason FROM assignments WHERE childId = :id ORDER BY startedAt',
      { id: child.id },
    )
    expect(holds.map((hold) => hold.endReason)).toEqual(['Fewer cases', null])

    expect((await allocate(lead, child.id, null)).status).toBe(204)
    expect((await other.get(`/api/children/${child.id}`)).status).toBe(404)
    expect(await selectOne('SELECT assigneeId, forRole FROM tasks WHERE id = :id', { id: task.id })).toEqual({
      assigneeId: null,
      forRole: 'clinicLead',
    })
  })

  it('leaves one open hold when two leads allocate at once', async () => {
    const child = await buildChild()
    await Promise.all([allocate(lead, child.id, holder.id), allocate(lead, child.id, colleague.id)])
    const open = await database().manager.countBy(Assignment, { childId: child.id })
    const ended = await selectRows(
      'SELECT id FROM assignments WHERE childId = :id AND endedAt IS NOT NULL AND endedAt <= :now',
      { id: child.id, now: now() },
    )
    expect(open - ended.length).toBe(1)
  })

  it.each([
    ['somebody who is no therapist', () => leadUser.id],
    ['the therapist who holds it already', () => holder.id],
    ['nobody we know', () => randomUUID()],
  ])('refuses %s', async (_what, therapistId) => {
    const child = await buildChild({ therapist: holder })
    const answer = await allocate(lead, child.id, therapistId())
    expect([answer.status, Object.keys(answer.body.fields)]).toEqual([422, ['therapistId']])
  })

  it('refuses the child’s own carer, a closed episode, and everybody but the lead', async () => {
    const child = await buildChild({ therapist: holder })
    await buildGuardian(child, colleague)
    expect((await allocate(lead, child.id, colleague.id)).body.fields).toHaveProperty('therapistId')
    const closed = await buildChild({ state: 'discharged' })
    expect((await allocate(lead, closed.id, holder.id)).body.code).toBe('closed')
    expect((await allocate(therapist, child.id, colleague.id)).status).toBe(403)
    expect((await allocate(administrator, child.id, colleague.id)).status).toBe(403)
    expect((await allocate(other, closed.id, colleague.id)).status).toBe(404)
  })
})
