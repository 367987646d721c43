import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { PupilView } from '../../shared/schoolAdvice.ts'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { AdviceAnswer } from '../../server/entities/AdviceAnswer.ts'
import { ClassTeacher } from '../../server/entities/ClassTeacher.ts'
import { WritingObservation } from '../../server/entities/WritingObservation.ts'
import { schoolPurposes } from '../../server/queries/scope.ts'
import { signedInAs, startApp, stopApp } from '../support/app.ts'
import {
  classesOf,
  classScene,
  done,
  openPupil,
  replyTo,
  sceneStart,
  type ClassScene,
  withoutId,
} from '../support/classes.ts'
import { buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'

beforeAll(startApp)
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

let scene: ClassScene

beforeEach(async () => {
  setClock(() => sceneStart)
  scene = await classScene()
})

describe('a teacher’s classes', () => {
  it('list the present ones, with the shared pupils and the advice not answered yet', async () => {
    const child = await scene.sharedPupil()
    const first = await scene.publish(child, 'S01')
    await scene.publish(child, 'S02')
    await scene.publish(child, 'T05', { endedAt: sceneStart })
    await scene.sharedPupil(['share_school_goals'])
    await buildClass(await buildUser('teacher'))
    expect((await replyTo(scene.greta, child, first, done)).status).toBe(200)
    expect(await classesOf(scene.greta)).toEqual([
      {
        id: scene.schoolClass.id,
        name: 'Heron',
        school: expect.stringMatching(/^School/),
        schoolYear: 2026,
        sharedPupils: 2,
        unanswered: 1,
      },
    ])
  })

  it('show pupils by name, page by page, with the advice in force and when it last changed', async () => {
    const child = await scene.sharedPupil(undefined, { preferredName: 'Aiko', familyName: 'Tanaka' })
    await scene.sharedPupil(['share_school_goals'], {
      preferredName: 'Zuri',
      familyName: 'Adeyemi',
      writingHand: 'right',
    })
    await scene.publish(child, 'S01', { publishedAt: new Date('2026-11-10T10:00:00Z') })
    await scene.publish(child, 'S02', { publishedAt: new Date('2026-11-18T10:00:00Z') })
    expect(await scene.pupils(scene.greta)).toEqual({
      total: 2,
      page: 1,
      size: 25,
      rows: [
        {
          id: child.id,
          name: 'Aiko Tanaka',
          writingHand: 'left',
          advice: 2,
          unanswered: 2,
          changedOn: '2026-11-18',
        },
        expect.objectContaining({ name: 'Zuri Adeyemi', writingHand: 'right', advice: 0, changedOn: null }),
      ],
    })
    expect(await scene.pupils(scene.greta, '?page=2&size=1')).toMatchObject({
      total: 2,
      rows: [{ name: 'Zuri Adeyemi' }],
    })
    expect(await scene.pupils(scene.greta, '?page=9')).toMatchObject({ total: 2, rows: [] })
    expect((await scene.greta.get(`/api/classes/${scene.schoolClass.id}/pupils?size=101`)).status).toBe(422)
  })

  it('of somebody else, left, not begun yet or absent are the same 404', async () => {
    await scene.sharedPupil()
    const other = await signedInAs(await buildUser('teacher'))
    const path = `/api/classes/${scene.schoolClass.id}/pupils`
    const answers = [
      await other.get(path),
      await other.get(`/api/classes/${randomUUID()}/pupils`),
      await other.get('/api/classes/x/pupils'),
    ]
    expect(answers.map(({ status }) => status)).toEqual([404, 404, 404])
    expect(new Set(answers.map(({ body }) => JSON.stringify(withoutId(body)))).size).toBe(1)

    const link = { schoolClassId: scene.schoolClass.id, teacherId: scene.teacher.id }
    await database().manager.update(ClassTeacher, link, { startedAt: new Date(sceneStart.getTime() + 1) })
    expect((await scene.greta.get(path)).status).toBe(404)
    await database().manager.update(ClassTeacher, link, { startedAt: new Date(0), endedAt: sceneStart })
    expect((await scene.greta.get(path)).status).toBe(404)
    expect(await classesOf(scene.greta)).toEqual([])
  })

  it.each(['therapist', 'clinicLead', 'administrator', 'guardian'] as const)(
    'are not an address for a %s',
    async (role) => {
      const child = await scene.sharedPupil()
      const adviceId = await scene.publish(child)
      const person = role === 'therapist' ? scene.therapist : await buildUser(role)
      if (role === 'guardian') await buildGuardian(child, person)
      const as = await signedInAs(person)
      expect((await as.get('/api/classes')).status).toBe(403)
      expect((await as.get(`/api/classes/${scene.schoolClass.id}/pupils`)).status).toBe(403)
      expect((await openPupil(as, child)).status).toBe(404)
      expect((await replyTo(as, child, adviceId, done)).status).toBe(404)
    },
  )
})

describe('a child the family does not share', () => {
  it('changes no answer by being in the class, whatever the clinic holds on it', async () => {
    await scene.sharedPupil()
    const look = async () => [
      (await scene.greta.get('/api/classes')).text,
      (await scene.greta.get(`/api/classes/${scene.schoolClass.id}/pupils`)).text,
      (await scene.greta.get(`/api/classes/${scene.schoolClass.id}/pupils?page=2&size=1`)).text,
    ]
    const before = await look()
    const hidden = await scene.pupil({ preferredName: 'Aaron', familyName: 'Hidden' })
    for (const purpose of ['assessment_treatment', 'email_link', 'video'] as const)
      await giveConsent(hidden, purpose, scene.therapist)
    const adviceId = await scene.publish(hidden)
    await scene.setGoal(hidden)
    expect(await look()).toEqual(before)

    const absent = { id: randomUUID() }
    const [known, unknown] = [await openPupil(scene.greta, hidden), await openPupil(scene.greta, absent)]
    expect([known.status, withoutId(known.body)]).toEqual([404, withoutId(unknown.body)])
    const [refused, nowhere] = [
      await replyTo(scene.greta, hidden, adviceId, done),
      await replyTo(scene.greta, absent, randomUUID(), done),
    ]
    expect([refused.status, withoutId(refused.body)]).toEqual([404, withoutId(nowhere.body)])
    expect(await database().manager.countBy(AdviceAnswer, { adviceId })).toBe(0)
  })
})

describe('what a teacher sees of a pupil', () => {
  const subsets = Array.from({ length: 2 ** schoolPurposes.length }, (_, bits) =>
    schoolPurposes.filter((_purpose, index) => (bits & (1 << index)) !== 0),
  )

  it.each(subsets.map((purposes) => [purposes.join(' + ') || 'nothing', purposes] as const))(
    'with consent to %s is exactly what it covers',
    async (_what, purposes) => {
      const child = await scene.sharedPupil([...purposes], { preferredName: 'Aiko', familyName: 'Tanaka' })
      await scene.publish(child)
      await scene.setGoal(child)
      const response = await openPupil(scene.greta, child)
      if (purposes.length === 0) return expect(response.status).toBe(404)
      expect(Object.keys(response.body).toSorted()).toEqual([
        'advice',
        'className',
        'goals',
        'id',
        'name',
        'writingHand',
      ])
      const view: PupilView = response.body
      expect(view).toMatchObject({
        id: child.id,
        name: 'Aiko Tanaka',
        className: 'Heron',
        writingHand: 'left',
      })
      const seating = purposes.includes('share_school_seating')
      expect(view.advice.map((advice) => advice.itemId)).toEqual(seating ? ['S01'] : [])
      expect(view.goals).toEqual(
        purposes.includes('share_school_goals') ? ['I want to write my own comics'] : [],
      )
      expect((await scene.pupils(scene.greta)).rows).toMatchObject([
        { advice: seating ? 1 : 0, unanswered: seating ? 1 : 0 },
      ])
      expect((await classesOf(scene.greta))[0]).toMatchObject({
        sharedPupils: 1,
        unanswered: seating ? 1 : 0,
      })
    },
  )

  it('is the advice with its reason, caution and check date, and nothing of how it came about', async () => {
    const child = await scene.sharedPupil()
    await scene.publish(child)
    const { advice } = (await openPupil(scene.greta, child)).body as PupilView
    expect(advice).toEqual([
      {
        id: expect.any(String),
        itemId: 'S01',
        text: expect.stringContaining('left seat of a shared desk'),
        because: 'Two writing elbows meet at this desk.',
        caution: expect.stringContaining('facing the board'),
        checkBy: '2026-12-18',
        publishedOn: '2026-11-20',
        endedOn: null,
        reply: null,
        can: { reply: true, end: false },
      },
    ])
  })

  it('holds nothing clinical and nothing of the family: not one word of the record in any answer', async () => {
    const child = await scene.sharedPupil([...schoolPurposes], {
      strengths: 'CANARY-STRENGTH',
      homeLanguages: 'CANARY-LANGUAGE',
      lookedAfter: true,
      nextReviewOn: '2027-01-15',
    })
    const parent = await buildUser('guardian', { displayName: 'CANARY-PARENT' })
    await buildGuardian(child, parent, { phone: '0161 496 0777', address: 'CANARY-ADDRESS' })
    await scene.setGoal(child)
    await database().manager.insert(WritingObservation, {
      id: randomUUID(),
      childId: child.id,
      observedOn: '2026-11-01',
      details: { note: 'CANARY-NOTE', painAfter: 7 } as WritingObservation['details'],
      observedById: scene.therapist.id,
      recordedAt: sceneStart,
    })
    const adviceId = await scene.publish(child)
    const answers = [
      await scene.greta.get('/api/classes'),
      await scene.greta.get(`/api/classes/${scene.schoolClass.id}/pupils`),
      await openPupil(scene.greta, child),
      await replyTo(scene.greta, child, adviceId, { reply: 'trying', reason: 'Since Monday' }),
    ]
    for (const { status, text, headers } of answers) {
      expect(status).toBe(200)
      const all = text + JSON.stringify(headers)
      for (const canary of [
        'CANARY',
        'CLINIC-ONLY',
        '0161 496 0777',
        parent.email,
        child.recordNumber,
        child.birthDate,
        '2027-01-15',
        'lookedAfter',
        'episode',
      ])
        expect(all).not.toContain(canary)
      // Words of the clinic's own work; none of them belongs in a school.
      expect(text).not.toMatch(
        /quotient|laterality|questionnaire|assessment|diagnos|referr|pain|session|letter|guardian|consent|score|baseline|waiting/i,
      )
    }
  })
})
