import { randomUUID } from 'node:crypto'
import { expect } from 'vitest'
import type { AnswerPage, AnswerRequestView } from '../../shared/answerRequests.ts'
import { addDays } from '../../shared/days.ts'
import type { FormAnswers } from '../../shared/forms.ts'
import { now } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { AnswerRequest } from '../../server/entities/AnswerRequest.ts'
import type { Child } from '../../server/entities/Child.ts'
import { hashToken, newToken } from '../../server/services/accounts.ts'
import { client, signedInAs, type Client } from './app.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from './factories.ts'
import { insertRow } from './insertRow.ts'
import { mailsTo } from './invitations.ts'
import { allAnswers } from './records.ts'

export const formId = 'hand-use-10.v1'
export const birthDate = '2018-05-04'

/**
 * A child with consents, a carer with and one without an account, and a teacher of the present class. A waiting child has
 * no therapist: `therapist` then finds nothing.
 */
export const askingScene = async (consents = true, { waiting = false } = {}) => {
  const holder = await buildUser('therapist')
  const teacher = await buildUser('teacher')
  const carer = await buildUser('guardian')
  const schoolClass = await buildClass(teacher)
  const child = await buildChild({
    ...(!waiting && { therapist: holder }),
    schoolClassId: schoolClass.id,
    birthDate,
  })
  const mother = await buildGuardian(child, carer)
  const grandfather = await buildGuardian(child, null, {
    name: 'Ambrose Tilling',
    relation: 'grandparent',
    email: `grandfather-${randomUUID().slice(0, 8)}@harrowmere.example`,
  })
  if (consents)
    for (const purpose of ['assessment_treatment', 'share_school_observation'] as const)
      await giveConsent(child, purpose, holder)
  return {
    holder,
    teacher,
    carer,
    schoolClass,
    child,
    mother,
    grandfather,
    therapist: await signedInAs(holder),
    asTeacher: await signedInAs(teacher),
    asCarer: await signedInAs(carer),
  }
}
export type AskingScene = Awaited<ReturnType<typeof askingScene>>

export const requestsPath = (child: Pick<Child, 'id'>, rest = '') =>
  `/api/children/${child.id}/answer-requests${rest}`

type Asked = Partial<Record<'asks' | 'formId' | 'answerer' | 'guardianId' | 'teacherId', string | null>> & {
  byLink?: boolean
  addressConfirmed?: boolean
}
export const asked = (given: Asked) => ({
  asks: 'questionnaire',
  formId: given.asks === 'history' ? null : formId,
  answerer: 'guardian',
  guardianId: null,
  teacherId: null,
  byLink: false,
  addressConfirmed: given.byLink === true,
  ...given,
})

/** Asks over HTTP and answers the request as the therapist sees it. */
export const ask = async (scene: AskingScene, given: Asked): Promise<AnswerRequestView> => {
  const response = await scene.therapist.post(requestsPath(scene.child)).send(asked(given))
  expect(response.status, response.text).toBe(201)
  return response.body
}
export const askMother = (scene: AskingScene) => ask(scene, { guardianId: scene.mother.id })
export const askTeacher = (scene: AskingScene) =>
  ask(scene, { answerer: 'teacher', teacherId: scene.teacher.id })
export const askByLink = (scene: AskingScene, given: Asked = {}) =>
  ask(scene, { guardianId: scene.grandfather.id, byLink: true, ...given })

export const seenRequest = async (scene: AskingScene, id: string): Promise<AnswerRequestView> => {
  const list: AnswerRequestView[] = (await scene.therapist.get(requestsPath(scene.child))).body.rows
  const found = list.find((request) => request.id === id)
  if (!found) throw new Error('The request is not listed')
  return found
}

/** The secret of the newest link queued to this address. */
export const linkToken = async (recipient: string): Promise<string> => {
  const token = /\/answer#([A-Za-z0-9_-]{43})/.exec((await mailsTo(recipient)).at(-1)?.text ?? '')?.[1]
  if (!token) throw new Error('No link was queued to this address')
  return token
}

/** As if this request had been sent, reminded of and answered in part a day and an hour earlier. */
export const aDayPasses = async (id: string): Promise<void> => {
  await database().query(
    `UPDATE answer_requests SET askedAt = askedAt - INTERVAL 25 HOUR, remindedAt = remindedAt - INTERVAL 25 HOUR,
       savedAt = savedAt - INTERVAL 25 HOUR WHERE id = ?`,
    [id],
  )
}

export const someAnswers = (): FormAnswers => allAnswers('left')
export const ownPage = (child: Pick<Child, 'id'>, id: string, rest = '') =>
  `/api/my/children/${child.id}/answer-requests/${id}${rest}`
export const pupilPage = (child: Pick<Child, 'id'>, id: string, rest = '') =>
  `/api/pupils/${child.id}/answer-requests/${id}${rest}`

export const put = (who: Client, path: string, version: number, body: object) =>
  who.put(path).set('If-Match', `"${version}"`).send(body)
export const send = (who: Client, path: string, version: number) =>
  who.post(`${path}/send`).set('If-Match', `"${version}"`).send({})
/** Saves and sends, as one who answers everything at once. */
export const saveAndSend = async (who: Client, path: string, body: object, version = 0): Promise<void> => {
  const saved = await put(who, path, version, body)
  expect(saved.status, saved.text).toBe(200)
  const sent = await send(who, path, saved.body.version)
  expect(sent.status, sent.text).toBe(204)
}

export const byLink = {
  open: (token: string, date = birthDate, who: Client = client()) =>
    who.post('/api/answer-links/open').send({ token, birthDate: date }),
  save: (token: string, version: number, body: object, who: Client = client()) =>
    who.put('/api/answer-links').send({ token, birthDate, version, ...body }),
  send: (token: string, version: number, who: Client = client()) =>
    who.post('/api/answer-links/send').send({ token, birthDate, version }),
}

/** A request as the app account writes it, with a link of its own when asked for. */
export const buildRequest = async (
  child: Pick<Child, 'id'>,
  by: { id: string },
  { link, ...given }: Partial<AnswerRequest> & { link?: boolean },
): Promise<{ request: AnswerRequest; token: string }> => {
  const token = newToken()
  const request = await insertRow(AnswerRequest, {
    id: randomUUID(),
    childId: child.id,
    asks: 'questionnaire',
    formId,
    answerer: given.teacherId ? 'teacher' : 'guardian',
    guardianId: null,
    teacherId: null,
    tokenHash: link ? hashToken(token) : null,
    askedAt: now(),
    askedById: by.id,
    expiresAt: new Date(now().getTime() + 28 * 86_400_000),
    reminders: 0,
    remindedAt: null,
    savedAt: null,
    mailId: null,
    answeredAt: null,
    cancelledAt: null,
    cancelledWhy: null,
    wrongDates: 0,
    ...given,
  })
  return { request, token }
}

export const tasksOf = (child: Pick<Child, 'id'>): Promise<{ kind: string; assigneeId: string }[]> =>
  database().query('SELECT kind, assigneeId FROM tasks WHERE childId = ? ORDER BY createdAt', [child.id])

export const laterDay = (days: number) => addDays(now().toISOString().slice(0, 10), days)
export type { AnswerPage }
