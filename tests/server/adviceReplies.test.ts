import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { AdviceAnswer } from '../../server/entities/AdviceAnswer.ts'
import { Child } from '../../server/entities/Child.ts'
import { signedInAs, startApp, stopApp } from '../support/app.ts'
import {
  classesOf,
  classScene,
  done,
  openPupil,
  replyTo,
  sceneStart,
  type ClassScene,
} from '../support/classes.ts'
import { buildClass, buildUser } from '../support/factories.ts'

beforeAll(startApp)
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

const atMoment = (moment: Date | number) => setClock(() => new Date(moment))
let scene: ClassScene

beforeEach(async () => {
  atMoment(sceneStart)
  scene = await classScene()
})

describe('answering advice', () => {
  it('keeps every answer; the newest one counts, for the teacher and for the therapist', async () => {
    const child = await scene.sharedPupil()
    const adviceId = await scene.publish(child)
    await replyTo(scene.greta, child, adviceId, { reply: 'trying', reason: null })
    atMoment(sceneStart.getTime() + 60_000)
    const answer = await replyTo(scene.greta, child, adviceId, {
      reply: 'cannot',
      reason: 'The desks are fixed to the floor',
    })
    expect(answer.status, answer.text).toBe(200)
    const shown = {
      answer: 'cannot',
      reason: 'The desks are fixed to the floor',
      by: 'Greta Fenwick',
      at: '2026-11-20T09:01:00.000Z',
    }
    expect(answer.body.advice[0].reply).toEqual(shown)
    const staff = await (await signedInAs(scene.therapist)).get(`/api/children/${child.id}/school`)
    expect(staff.body.published[0].reply).toEqual(shown)
    const rows = await database().manager.find(AdviceAnswer, { where: { adviceId }, order: { at: 'ASC' } })
    expect(rows.map((row) => row.reply)).toEqual(['trying', 'cannot'])
    await expect(
      database().query("UPDATE advice_answers SET reply = 'done' WHERE adviceId = ?", [adviceId]),
    ).rejects.toThrow(/denied|written once/)
    await expect(
      database().query('DELETE FROM advice_answers WHERE adviceId = ?', [adviceId]),
    ).rejects.toThrow(/denied|never removed/)
  })

  it.each<[string, object, string]>([
    ['"cannot" without a reason', { reply: 'cannot', reason: null }, 'reason'],
    ['"cannot" with an empty reason', { reply: 'cannot', reason: '  ' }, 'reason'],
    ['an answer that is none', { reply: 'maybe', reason: null }, 'reply'],
    ['a reason longer than is kept', { reply: 'done', reason: 'x'.repeat(501) }, 'reason'],
    ['a name in the form', { ...done, byId: randomUUID() }, 'form'],
  ])('refuses %s beside the field', async (_what, body, field) => {
    const child = await scene.sharedPupil()
    const adviceId = await scene.publish(child)
    const response = await replyTo(scene.greta, child, adviceId, body)
    expect([response.status, Object.keys(response.body.fields)]).toEqual([422, [field]])
    expect(await database().manager.countBy(AdviceAnswer, { adviceId })).toBe(0)
  })

  it('sent twice under one key is one answer', async () => {
    const child = await scene.sharedPupil()
    const adviceId = await scene.publish(child)
    const path = `/api/pupils/${child.id}/advice/${adviceId}/replies`
    const key = randomUUID()
    const send = () => scene.greta.post(path).set('Idempotency-Key', key).send(done)
    expect([(await send()).status, (await send()).status]).toEqual([200, 200])
    expect(await database().manager.countBy(AdviceAnswer, { adviceId })).toBe(1)
  })

  it('to an item the clinic has ended says so', async () => {
    const child = await scene.sharedPupil()
    const adviceId = await scene.publish(child, 'S01', { endedAt: sceneStart, endedById: scene.therapist.id })
    const response = await replyTo(scene.greta, child, adviceId, done)
    expect([response.status, response.body.code]).toEqual([409, 'closed'])
  })

  it('is a 404 for another child’s item, an absent one, and while only goals are shared', async () => {
    const child = await scene.sharedPupil()
    const other = await scene.sharedPupil()
    const goalsOnly = await scene.sharedPupil(['share_school_goals'])
    const items = [await scene.publish(other), randomUUID(), 'x']
    for (const id of items) expect((await replyTo(scene.greta, child, id, done)).status).toBe(404)
    expect((await replyTo(scene.greta, goalsOnly, await scene.publish(goalsOnly), done)).status).toBe(404)
    expect(await database().manager.countBy(AdviceAnswer, { adviceId: items[0] })).toBe(0)
  })

  it('starts anew for the next teacher; the therapist keeps the earlier answer', async () => {
    const child = await scene.sharedPupil()
    const adviceId = await scene.publish(child)
    await replyTo(scene.greta, child, adviceId, { reply: 'cannot', reason: 'CANARY of the last class' })
    const next = await buildUser('teacher')
    const nextClass = await buildClass(next)
    await database().manager.update(Child, { id: child.id }, { schoolClassId: nextClass.id })
    const as = await signedInAs(next)
    const seen = await openPupil(as, child)
    expect(seen.body.advice).toMatchObject([{ id: adviceId, reply: null }])
    expect(seen.text).not.toContain('CANARY')
    expect(await classesOf(as)).toMatchObject([{ unanswered: 1 }])
    const staff = await (await signedInAs(scene.therapist)).get(`/api/children/${child.id}/school`)
    expect(staff.body.published[0].reply.answer).toBe('cannot')
  })
})
