import { randomUUID } from 'node:crypto'
import { expect } from 'vitest'
import type { ConsentPurpose } from '../../shared/consents.ts'
import type { PupilPage, TeacherClassRow } from '../../shared/schoolAdvice.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Goal } from '../../server/entities/Goal.ts'
import { SchoolAdvice } from '../../server/entities/SchoolAdvice.ts'
import { signedInAs, type Client } from './app.ts'
import { buildChild, buildClass, buildUser, giveConsent, type ChildRequest } from './factories.ts'

/** The moment at which scenes with a class are built; tests move the clock on from here. */
export const sceneStart = new Date('2026-11-20T09:00:00Z')

/** A therapist, and a teacher signed in, with one class; and what a test puts into it. */
export const classScene = async () => {
  const therapist = await buildUser('therapist', { displayName: 'Adaeze Nwosu-Reid' })
  const teacher = await buildUser('teacher', { displayName: 'Greta Fenwick' })
  const schoolClass = await buildClass(teacher, { name: 'Heron' })
  const greta = await signedInAs(teacher)

  const pupil = (given: ChildRequest = {}) =>
    buildChild({ therapist, schoolClassId: schoolClass.id, ...given })
  const sharedPupil = async (
    purposes: ConsentPurpose[] = ['share_school_seating'],
    given: ChildRequest = {},
  ) => {
    const child = await pupil(given)
    for (const purpose of purposes) await giveConsent(child, purpose, therapist)
    return child
  }
  const publish = async (
    child: Pick<Child, 'id'>,
    itemId = 'S01',
    given: Partial<SchoolAdvice> = {},
  ): Promise<string> => {
    const advice = {
      id: randomUUID(),
      childId: child.id,
      itemId,
      because: 'Two writing elbows meet at this desk.',
      checkBy: '2026-12-18',
      publishedAt: sceneStart,
      publishedById: therapist.id,
      endedAt: null,
      endedById: null,
      ...given,
    }
    await database().manager.insert(SchoolAdvice, advice)
    return advice.id
  }
  const setGoal = (child: Pick<Child, 'id'>) =>
    database().manager.insert(Goal, {
      id: randomUUID(),
      childId: child.id,
      details: {
        activity: 'CLINIC-ONLY activity',
        childVoice: 'I want to write my own comics',
        levels: ['CLINIC-ONLY level', 'b', 'c', 'd', 'e'],
        baseline: -2,
        importance: 2,
        difficulty: 2,
        targetOn: '2027-03-01',
      },
      setOn: '2026-11-01',
      endedOn: null,
      outcome: null,
      setById: therapist.id,
      createdAt: sceneStart,
    })
  const pupils = async (as: Client, query = ''): Promise<PupilPage> => {
    const response = await as.get(`/api/classes/${schoolClass.id}/pupils${query}`)
    expect(response.status, response.text).toBe(200)
    return response.body
  }
  return { therapist, teacher, greta, schoolClass, pupil, sharedPupil, publish, setGoal, pupils }
}

export type ClassScene = Awaited<ReturnType<typeof classScene>>

export const classesOf = async (as: Client): Promise<TeacherClassRow[]> => {
  const response = await as.get('/api/classes')
  expect(response.status, response.text).toBe(200)
  return response.body
}

export const openPupil = (as: Client, child: Pick<Child, 'id'>) => as.get(`/api/pupils/${child.id}`)

export const replyTo = (as: Client, child: Pick<Child, 'id'>, adviceId: string, body: object) =>
  as.post(`/api/pupils/${child.id}/advice/${adviceId}/replies`).send(body)

export const done = { reply: 'done', reason: null }

/** A refusal without its request id, to be compared with another. */
export const withoutId = (body: object) => ({ ...body, requestId: '' })
