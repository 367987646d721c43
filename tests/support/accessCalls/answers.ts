import { buildRequest, asked, birthDate } from '../answers.ts'
import { buildChild, buildGuardian, giveConsent } from '../factories.ts'
import { allAnswers, buildQuestionnaire } from '../records.ts'
import type { Call, Calls, On } from './call.ts'

const toACarer = async ({ child }: On): Promise<Call> => {
  const carer = await buildGuardian(child.child, null, { email: 'asked@harrowmere.example' })
  const { request } = await buildRequest(child.child, child.therapist, { guardianId: carer.id, link: true })
  return { ids: [request.id], version: request.version, body: {} }
}

/** What this person was asked; somebody who was not asked meets the request of the one who was. */
const askedOf = async ({ child, person, standing }: On, answerer: 'guardian' | 'teacher') => {
  const own = child.guardians.get(person.key) ?? [...child.guardians.values()][0]
  const of =
    answerer === 'teacher'
      ? { teacherId: person.user.id }
      : { guardianId: standing === 'G1' ? own?.id : [...child.guardians.values()][0]?.id }
  const { request } = await buildRequest(child.child, child.therapist, of)
  return request
}

const read = (answerer: 'guardian' | 'teacher') => async (on: On) => ({
  ids: [(await askedOf(on, answerer)).id],
})
const save = (answerer: 'guardian' | 'teacher') => async (on: On) => ({
  ids: [(await askedOf(on, answerer)).id],
  version: 0,
  body: { answers: allAnswers(), comment: null },
})
const send = (answerer: 'guardian' | 'teacher') => async (on: On) => {
  const request = await askedOf(on, answerer)
  const response = await buildQuestionnaire(on.child.child, on.child.therapist, {
    locked: false,
    informant: answerer,
    requestId: request.id,
  })
  return { ids: [request.id], version: response.version, body: {} }
}

/** A link belongs to nobody who signs in, so it is used from a browser in which nobody is. */
const byLink =
  (rest: (request: { id: string }, on: On, child: { id: string }) => object | Promise<object>) =>
  async (on: On): Promise<Call> => {
    const { therapist } = on.child
    const child = await buildChild({ therapist, birthDate })
    await giveConsent(child, 'assessment_treatment', therapist)
    const carer = await buildGuardian(child, null, { email: 'link@harrowmere.example' })
    const { request, token } = await buildRequest(child, therapist, { guardianId: carer.id, link: true })
    return {
      instead: { user: on.person.user, cookie: [] },
      body: { token, birthDate, ...(await rest(request, on, child)) },
    }
  }

/** What the clinic asks of carers and teachers, and how they answer. */
export const answerCalls: Calls = {
  'GET /api/children/:childId/answer-requests': () => ({}),
  'GET /api/children/:childId/answer-choices': () => ({}),
  'POST /api/children/:childId/answer-requests': async ({ child }) => ({
    body: asked({
      guardianId: (await buildGuardian(child.child, null, { email: 'asked@harrowmere.example' })).id,
      byLink: true,
    }),
  }),
  'POST /api/children/:childId/answer-requests/:id/cancel': toACarer,
  'POST /api/children/:childId/answer-requests/:id/remind': toACarer,

  'GET /api/my/to-answer': () => ({}),
  'GET /api/my/children/:childId/answer-requests/:id': read('guardian'),
  'PUT /api/my/children/:childId/answer-requests/:id': save('guardian'),
  'POST /api/my/children/:childId/answer-requests/:id/send': send('guardian'),
  'GET /api/pupils/to-answer': () => ({}),
  'GET /api/pupils/:childId/answer-requests/:id': read('teacher'),
  'PUT /api/pupils/:childId/answer-requests/:id': save('teacher'),
  'POST /api/pupils/:childId/answer-requests/:id/send': send('teacher'),

  'POST /api/answer-links/open': byLink(() => ({})),
  'PUT /api/answer-links': byLink(() => ({ version: 0, answers: allAnswers(), comment: null })),
  'POST /api/answer-links/send': byLink(async (request, on, child) => ({
    version: (await buildQuestionnaire(child, on.child.therapist, { locked: false, requestId: request.id }))
      .version,
  })),
}
