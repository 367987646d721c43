import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { Child } from '../../server/entities/Child.ts'
import { ClassTeacher } from '../../server/entities/ClassTeacher.ts'
import { Guardian } from '../../server/entities/Guardian.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import {
  classesOf,
  classScene,
  done,
  openPupil,
  replyTo,
  sceneStart,
  type ClassScene,
} from '../support/classes.ts'
import { buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'

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

describe('access ends with the next request', () => {
  const statuses = async (as: Client, child: Pick<Child, 'id'>, adviceId: string) => [
    (await openPupil(as, child)).status,
    (await replyTo(as, child, adviceId, done)).status,
    (await scene.pupils(as)).total,
    (await classesOf(as))[0]?.sharedPupils,
  ]
  const open = [200, 200, 1, 1]
  const shut = [404, 404, 0, 0]

  it.each([
    ['one millisecond before it is given', -1, shut],
    ['the moment it is given', 0, open],
    ['one millisecond before it ends', 59_999, open],
    ['the moment it ends', 60_000, shut],
  ])('when a consent runs out: %s', async (_what, offset, expected) => {
    const given = new Date(sceneStart.getTime() + 5000)
    const child = await scene.pupil()
    await giveConsent(child, 'share_school_seating', scene.therapist, {
      at: given,
      expiresAt: new Date(given.getTime() + 60_000),
    })
    const adviceId = await scene.publish(child)
    atMoment(given.getTime() + offset)
    expect(await statuses(scene.greta, child, adviceId)).toEqual(expected)
  })

  it('when it is withdrawn by the family, and opens again when given anew', async () => {
    const parent = await buildUser('guardian')
    const child = await scene.pupil()
    await buildGuardian(child, parent)
    const family = await signedInAs(parent)
    const adviceId = await scene.publish(child)
    const consents = `/api/my/children/${child.id}/consents`
    expect(await statuses(scene.greta, child, adviceId)).toEqual(shut)
    expect((await family.post(consents).send({ purpose: 'share_school_seating' })).status).toBe(204)
    expect(await statuses(scene.greta, child, adviceId)).toEqual(open)
    const view = await family.get(`/api/my/children/${child.id}`)
    const { consentId } = view.body.consents.find(
      (consent: { purpose: string }) => consent.purpose === 'share_school_seating',
    )
    expect((await family.post(`${consents}/${consentId}/withdraw`).send({ reason: null })).status).toBe(204)
    expect(await statuses(scene.greta, child, adviceId)).toEqual(shut)
    await family.post(consents).send({ purpose: 'share_school_seating' })
    expect(await statuses(scene.greta, child, adviceId)).toEqual(open)
  })

  it('when one of two overlapping consents is withdrawn the other still holds', async () => {
    const child = await scene.sharedPupil()
    const second = await giveConsent(child, 'share_school_seating', scene.therapist)
    const adviceId = await scene.publish(child)
    await giveConsent(child, 'share_school_seating', scene.therapist, {
      kind: 'withdrawn',
      withdrawsId: second.id,
    })
    expect(await statuses(scene.greta, child, adviceId)).toEqual(open)
  })

  it('when the child moves to another class, and begins there', async () => {
    const child = await scene.sharedPupil()
    const adviceId = await scene.publish(child)
    const next = await buildUser('teacher')
    const nextClass = await buildClass(next)
    const as = await signedInAs(next)
    expect((await openPupil(as, child)).status).toBe(404)
    expect(await statuses(scene.greta, child, adviceId)).toEqual(open)
    await database().manager.update(Child, { id: child.id }, { schoolClassId: nextClass.id })
    expect(await statuses(scene.greta, child, adviceId)).toEqual(shut)
    expect((await openPupil(as, child)).status).toBe(200)
  })

  it('when the teacher leaves the class, and not before', async () => {
    const child = await scene.sharedPupil()
    const adviceId = await scene.publish(child)
    const link = { schoolClassId: scene.schoolClass.id, teacherId: scene.teacher.id }
    await database().manager.update(ClassTeacher, link, { endedAt: new Date(sceneStart.getTime() + 60_000) })
    atMoment(sceneStart.getTime() + 59_999)
    expect(await statuses(scene.greta, child, adviceId)).toEqual(open)
    atMoment(sceneStart.getTime() + 60_000)
    expect((await openPupil(scene.greta, child)).status).toBe(404)
    expect((await replyTo(scene.greta, child, adviceId, done)).status).toBe(404)
    expect(await classesOf(scene.greta)).toEqual([])
  })
})

describe('a teacher who is also family of a pupil', () => {
  it('meets the child as family only', async () => {
    await database().query('UPDATE users SET roles = ? WHERE id = ?', [
      '["teacher","guardian"]',
      scene.teacher.id,
    ])
    const own = await scene.sharedPupil()
    const adviceId = await scene.publish(own)
    await buildGuardian(own, scene.teacher)
    expect((await scene.pupils(scene.greta)).total).toBe(0)
    expect(await classesOf(scene.greta)).toMatchObject([{ sharedPupils: 0, unanswered: 0 }])
    expect((await openPupil(scene.greta, own)).status).toBe(404)
    expect((await replyTo(scene.greta, own, adviceId, done)).status).toBe(404)
    expect((await scene.greta.get(`/api/my/children/${own.id}`)).status).toBe(200)
  })

  it('and under a restriction not at all', async () => {
    const own = await scene.sharedPupil()
    const adviceId = await scene.publish(own)
    const guardian = await buildGuardian(own, scene.teacher, { restricted: true })
    const look = async () => [
      (await scene.pupils(scene.greta)).total,
      (await classesOf(scene.greta))[0]?.sharedPupils,
      (await openPupil(scene.greta, own)).status,
      (await replyTo(scene.greta, own, adviceId, done)).status,
    ]
    expect(await look()).toEqual([0, 0, 404, 404])
    await database().manager.update(Guardian, { id: guardian.id }, { restricted: false, endedAt: sceneStart })
    expect(await look()).toEqual([1, 1, 200, 200])
  })
})
