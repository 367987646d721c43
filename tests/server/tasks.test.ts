import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { selectOne } from '../../server/queries/sql.ts'
import type { User } from '../../server/entities/User.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser } from '../support/factories.ts'
import { buildAlert } from '../support/clinicRows.ts'
import { buildTask } from '../support/tasks.ts'

let holder: User
let therapist: Client
let other: Client
let lead: Client
let administrator: Client

beforeAll(async () => {
  await startApp()
  holder = await buildUser('therapist')
  therapist = await signedInAs(holder)
  other = await signedInAs(await buildUser('therapist'))
  lead = await signedInAs(await buildUser('clinicLead'))
  administrator = await signedInAs(await buildUser('administrator'))
})
afterAll(stopApp)

const finish = async (who: Client, id: string) => (await who.post(`/api/tasks/${id}/finish`)).status
const doneBy = async (id: string) =>
  (await selectOne<{ doneById: string | null }>('SELECT doneById FROM tasks WHERE id = :id', { id }))
    ?.doneById

describe('finishing a task', () => {
  it('is done by the person who holds it, once', async () => {
    const child = await buildChild({ therapist: holder })
    const task = await buildTask({ childId: child.id, assigneeId: holder.id })
    expect(await finish(therapist, task.id)).toBe(204)
    expect(await doneBy(task.id)).toBe(holder.id)
    const again = await lead.post(`/api/tasks/${task.id}/finish`)
    expect([again.status, again.body.code]).toEqual([409, 'closed'])
    expect(await doneBy(task.id)).toBe(holder.id)
  })

  it('of a warning sign is done by writing down what was done, not by ticking it off', async () => {
    const child = await buildChild({ therapist: holder })
    const task = await buildTask({ childId: child.id, assigneeId: holder.id, kind: 'red_flag' })
    const alert = await buildAlert(child, 'Holds the other hand in a fist')
    const ticked = await therapist.post(`/api/tasks/${task.id}/finish`)
    expect([ticked.status, ticked.body.code]).toEqual([409, 'answer_needed'])
    const answered = await therapist
      .post(`/api/children/${child.id}/alerts/${alert.id}/action`)
      .send({ action: 'Rang the family; seen the same day.' })
    expect(answered.status).toBe(204)
    expect(await doneBy(task.id)).toBe(holder.id)
  })

  it('is done by anybody of the role that holds it', async () => {
    const task = await buildTask({ forRole: 'administrator' })
    expect(await finish(therapist, task.id)).toBe(404)
    expect(await finish(administrator, task.id)).toBe(204)
  })

  it('answers 404 to those who may not see the child, and 403 to those who may but do not hold the task', async () => {
    const child = await buildChild({ therapist: holder })
    const task = await buildTask({ childId: child.id, forRole: 'clinicLead' })
    expect(await finish(other, task.id)).toBe(404)
    expect(await finish(administrator, task.id)).toBe(404)
    expect(await finish(therapist, task.id)).toBe(403)
    expect(await doneBy(task.id)).toBeNull()
    expect(await finish(lead, task.id)).toBe(204)
  })

  it('ends with the hold: a therapist who no longer has the child cannot finish its task', async () => {
    const child = await buildChild()
    const task = await buildTask({ childId: child.id, assigneeId: holder.id })
    expect(await finish(therapist, task.id)).toBe(404)
  })

  it('is not done on one’s own child', async () => {
    const child = await buildChild({ therapist: holder })
    await buildGuardian(child, holder)
    const task = await buildTask({ childId: child.id, assigneeId: holder.id })
    expect(await finish(therapist, task.id)).toBe(404)
  })

  it('is closed to parents and teachers, to the signed out, and finds no absent task', async () => {
    const parent = await signedInAs(await buildUser('guardian'))
    const task = await buildTask({ forRole: 'administrator' })
    expect(await finish(parent, task.id)).toBe(403)
    expect(await finish(client(), task.id)).toBe(401)
    expect(await finish(lead, randomUUID())).toBe(404)
    expect(await finish(lead, '7')).toBe(404)
  })
})
