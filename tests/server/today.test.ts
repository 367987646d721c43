import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { CaseloadPage } from '../../shared/caseload.ts'
import { addDays } from '../../shared/days.ts'
import type { TodayView } from '../../shared/today.ts'
import { setClock } from '../../server/clock.ts'
import type { User } from '../../server/entities/User.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildBusyCaseload, utcToday } from '../support/busyCaseload.ts'
import { buildChild, buildUser } from '../support/factories.ts'
import { buildNote } from '../support/records.ts'
import { enterReferral } from '../support/referrals.ts'
import { buildTask } from '../support/tasks.ts'

let therapistUser: User
let therapist: Client
let lead: Client
let administrator: Client

beforeAll(async () => {
  await startApp()
  therapistUser = await buildUser('therapist', { displayName: 'Hedda Holder' })
  const leadUser = await buildUser('clinicLead')
  await buildBusyCaseload({ therapist: therapistUser, lead: leadUser }, 10)
  therapist = await signedInAs(therapistUser)
  lead = await signedInAs(leadUser)
  administrator = await signedInAs(await buildUser('administrator'))
  await enterReferral(administrator, { familyName: 'Queued', receivedOn: addDays(utcToday(), -3) })
})
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

const today = async (who: Client) => (await who.get('/api/today')).body as TodayView
const groupsOf = ({ groups }: TodayView) => Object.fromEntries(groups.map((group) => [group.id, group.total]))

describe('today', () => {
  it('of a therapist holds what waits on their own children, and the queue without a name', async () => {
    const view = await today(therapist)
    expect(view.greeting).toMatch(/^Good (morning|afternoon|evening), Hedda$/)
    expect(groupsOf(view)).toEqual({
      tasks: 2,
      notes: 1,
      countersign: 1,
      'letters-failed': 1,
      // One draft and the approved letter whose only delivery failed.
      'letters-own': 2,
      reviews: 2,
      referrals: 1,
    })
    expect(JSON.stringify(view)).not.toContain('Queued')
    const waiting = view.groups.find((group) => group.id === 'referrals')?.items[0]
    expect(waiting).toMatchObject({
      title: expect.stringMatching(/^A child of \d+ to \d+ years, received \d{1,2} [A-Z][a-z]{2} \d{4}$/),
      detail: 'Referral, to be looked at',
    })
    const draft = view.groups
      .find((group) => group.id === 'letters-own')
      ?.items.find((item) => item.detail === 'Letter: draft')
    const { rows } = (await therapist.get('/api/caseload?need=letter_draft')).body as CaseloadPage
    expect(rows[0]?.needs.find((need) => need.kind === 'letter_draft')?.level).toBe(draft?.level)
    expect(draft?.level).toBe('soon')
    const task = view.groups.find((group) => group.id === 'tasks')?.items[0]
    expect(task).toMatchObject({ title: 'Call the family', level: 'overdue', taskId: expect.any(String) })
    expect(task?.detail).toMatch(/^Busy07 Caseload07, FF-.* Due /)
    const note = view.groups.find((group) => group.id === 'notes')?.items[0]
    expect(note?.to).toMatch(/^\/children\/[0-9a-f-]{36}\/sessions\/[0-9a-f-]{36}$/)
  })

  it('of a lead holds what only a lead can do, by name', async () => {
    const view = await today(lead)
    expect(groupsOf(view)).toEqual({
      letters: 1,
      'letters-failed': 1,
      'notes-late': 1,
      'reviews-late': 1,
      referrals: 1,
    })
    expect(JSON.stringify(view)).toContain('Ottoline Queued')
  })

  it('of the office holds referrals and its own tasks, nothing clinical', async () => {
    await buildTask({ forRole: 'administrator', text: 'Ring the school back' })
    const view = await today(administrator)
    expect(groupsOf(view)).toEqual({ tasks: 1, referrals: 1 })
    expect(view.groups[0]?.items[0]).toMatchObject({
      title: 'Ring the school back',
      to: '/today',
      level: 'soon',
    })
  })

  it('shows five lines of a group and counts them all; finished tasks are gone', async () => {
    const other = await buildUser('therapist')
    const who = await signedInAs(other)
    const tasks = []
    for (let index = 0; index < 7; index += 1)
      tasks.push(await buildTask({ assigneeId: other.id, dueOn: addDays(utcToday(), index) }))
    const before = (await today(who)).groups.find((group) => group.id === 'tasks')
    expect([before?.total, before?.items.length]).toEqual([7, 5])
    expect(before?.items[0]).toMatchObject({ level: 'due' })
    await who.post(`/api/tasks/${tasks[0]?.id}/finish`)
    expect(groupsOf(await today(who)).tasks).toBe(6)
  })

  it('of another therapist holds nothing of these children', async () => {
    const view = await today(await signedInAs(await buildUser('therapist')))
    expect(groupsOf(view)).toEqual({ referrals: 1 })
  })

  it('follows the clock: a note gets more pressing by the hour', async () => {
    const fresh = await buildUser('therapist')
    const child = await buildChild({ therapist: fresh })
    // Tomorrow's session, looked at from the hours after it.
    const heldOn = addDays(utcToday(), 1)
    await buildNote(child, fresh, 'draft', { heldOn })
    const endedAt = new Date(`${heldOn}T11:00:00Z`).getTime()
    const levelAfter = async (hours: number) => {
      setClock(() => new Date(endedAt + hours * 3_600_000))
      const who = await signedInAs(fresh)
      return (await today(who)).groups.find((group) => group.id === 'notes')?.items[0]?.level
    }
    expect([await levelAfter(1), await levelAfter(25), await levelAfter(52)]).toEqual([
      'soon',
      'due',
      'overdue',
    ])
    setClock(() => new Date())
  })

  it('is for staff', async () => {
    for (const role of ['teacher', 'guardian'] as const)
      expect((await (await signedInAs(await buildUser(role))).get('/api/today')).status).toBe(403)
    expect((await client().get('/api/today')).status).toBe(401)
  })
})
