import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { emptyConclusion } from '../../shared/conclusions.ts'
import { emptyHistory } from '../../shared/histories.ts'
import { database } from '../../server/dataSource.ts'
import { formsOfTheStart } from '../../server/migrations/1764580000000-formsOfTheStart.ts'
import { client, signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import {
  askingScene,
  asked,
  birthDate,
  buildRequest,
  ownPage,
  pupilPage,
  requestsPath,
  someAnswers,
} from '../support/answers.ts'
import { buildConclusion } from '../support/conclusions.ts'
import { buildUser } from '../support/factories.ts'
import { buildHistory } from '../support/histories.ts'
import { buildMeasure, pegsDetails, reachingDetails } from '../support/measures.ts'
import { buildQuestionnaire, seenOn } from '../support/records.ts'

/*
 * Hostile input at every route of the assessment that takes a body: a part of a body that would be taken is replaced
 * by a hostile value. Nothing may be answered with 5xx.
 */

beforeAll(startApp)
afterAll(stopApp)

/** JSON text, so that values which no object can hold are sent too. */
const hostile = [
  'null',
  'true',
  '0',
  '-0',
  '-1',
  '1.5',
  '1e308',
  '1e999',
  '9007199254740993',
  '""',
  '" "',
  '"a\\u0000b"',
  '"\\ud800"',
  '"\\u202eabc"',
  '"__proto__"',
  `"${'x'.repeat(100_000)}"`,
  '"2026-02-30"',
  '"9999-99-99"',
  '[]',
  '{}',
  '[null]',
  '[[]]',
  '{"__proto__":{"a":1},"constructor":"x","toString":1}',
  `${'['.repeat(30_000)}${']'.repeat(30_000)}`,
  `${'{"a":'.repeat(20_000)}1${'}'.repeat(20_000)}`,
  `[${Array.from({ length: 3000 }, () => '0').join(',')}]`,
]

type Json = null | boolean | number | string | Json[] | { [key: string]: Json }

const mark = (): string => `@@${randomUUID()}@@`

/** Every body with one part replaced by `text`, and one with a field that is not known. */
function bodiesWith(body: Json, text: string): string[] {
  const found: string[] = []
  const visit = (part: Json, put: (value: Json) => Json) => {
    const place = mark()
    found.push(JSON.stringify(put(place)).replace(`"${place}"`, () => text))
    if (Array.isArray(part))
      // The first of a list stands for all.
      part.slice(0, 1).forEach((one, index) => visit(one, (value) => put(part.with(index, value))))
    else if (part !== null && typeof part === 'object')
      for (const [key, value] of Object.entries(part)) visit(value, (other) => put({ ...part, [key]: other }))
  }
  visit(body, (value) => value)
  return found
}

interface Case {
  who: Client
  method: 'post' | 'put'
  path: string
  body: object
  version?: number
}

const scene = async () => {
  const asking = await askingScene()
  const { child, holder, mother, teacher, grandfather, therapist } = asking
  const lead = await signedInAs(await buildUser('clinicLead'))
  const path = (rest: string) => `/api/children/${child.id}/${rest}`
  const questionnaire = await buildQuestionnaire(child, holder, { locked: false })
  const history = await buildHistory(child, holder, { locked: false })
  const reaching = await buildMeasure(child, holder, {
    locked: false,
    kind: 'reaching',
    details: reachingDetails(),
  })
  const pegs = await buildMeasure(child, holder, {
    locked: false,
    kind: 'pegs',
    details: pegsDetails([9], [8]),
  })
  const sides = await buildMeasure(child, holder, { locked: false, kind: 'sides' })
  const seating = await buildMeasure(child, holder, { locked: false, kind: 'seating' })
  const conclusion = await buildConclusion(child, holder, 'draft')
  const carers = await buildRequest(child, holder, { guardianId: mother.id })
  const told = await buildRequest(child, holder, { guardianId: mother.id, asks: 'history', formId: null })
  const teachers = await buildRequest(child, holder, { teacherId: teacher.id })
  const link = await buildRequest(child, holder, { guardianId: grandfather.id, link: true })
  const proof = { token: link.token, birthDate }
  const draft = { answers: someAnswers(), comment: null }
  const told2 = { respondentName: 'Mother', answeredOn: seenOn() }
  const measured = { measuredOn: seenOn(), notDoneReason: null, comment: null }
  const form = formsOfTheStart[0]
  const measure = (one: { id: string; version: number; details: unknown }): Case => ({
    who: therapist,
    method: 'put',
    path: path(`measures/${one.id}`),
    body: { ...measured, details: one.details },
    version: one.version,
  })
  const cases: Case[] = [
    { who: therapist, method: 'post', path: requestsPath(child), body: asked({ guardianId: mother.id }) },
    { who: therapist, method: 'post', path: path('histories'), body: { ...told2, replacesId: null } },
    {
      who: therapist,
      method: 'put',
      path: path(`histories/${history.id}`),
      body: { ...told2, details: emptyHistory },
      version: history.version,
    },
    {
      who: therapist,
      method: 'post',
      path: path('measures'),
      body: {
        kind: 'pegs',
        measuredOn: seenOn(),
        replacesId: null,
        options: { cardsPerPlace: null, startHand: null, pegs: 10, seconds: null },
      },
    },
    measure(reaching),
    measure(pegs),
    measure(sides),
    measure(seating),
    { who: therapist, method: 'post', path: path('alerts'), body: { flag: 'tremor', words: 'Hands shake' } },
    { who: therapist, method: 'post', path: path('conclusions'), body: { replacesId: null } },
    {
      who: therapist,
      method: 'put',
      path: path(`conclusions/${conclusion.id}`),
      body: { ...emptyConclusion, evidence: [{ kind: 'measure', id: randomUUID() }] },
      version: conclusion.version,
    },
    {
      who: therapist,
      method: 'post',
      path: path(`conclusions/${conclusion.id}/sign`),
      body: { confirmed: true },
      version: 9999,
    },
    {
      who: therapist,
      method: 'post',
      path: path('questionnaires'),
      body: {
        formId: 'hand-use-10.v1',
        informant: 'guardian',
        respondentName: null,
        answeredOn: seenOn(),
        replacesId: null,
      },
    },
    {
      who: therapist,
      method: 'put',
      path: path(`questionnaires/${questionnaire.id}`),
      body: {
        informant: 'guardian',
        respondentName: null,
        answeredOn: seenOn(),
        answers: someAnswers(),
        cutOffSet: questionnaire.cutOffSet,
        comment: null,
      },
      version: questionnaire.version,
    },
    {
      who: lead,
      method: 'post',
      path: '/api/forms',
      body: { key: form?.key, definition: form?.definition ?? {} },
    },
    { who: asking.asCarer, method: 'put', path: ownPage(child, carers.request.id), body: draft, version: 0 },
    {
      who: asking.asCarer,
      method: 'put',
      path: ownPage(child, told.request.id),
      body: { history: emptyHistory },
      version: 0,
    },
    {
      who: asking.asTeacher,
      method: 'put',
      path: pupilPage(child, teachers.request.id),
      body: draft,
      version: 0,
    },
    { who: client(), method: 'post', path: '/api/answer-links/open', body: proof },
    { who: client(), method: 'put', path: '/api/answer-links', body: { ...proof, version: 0, ...draft } },
    { who: client(), method: 'post', path: '/api/answer-links/send', body: { ...proof, version: 0 } },
  ]
  return cases
}

/**
 * Answers of 5xx, by route and value. One body for each route and value is sent, another part of it each time; all
 * 8,086 of them take two minutes, and were sent when this was written.
 */
const faultsOf = async (cases: readonly Case[], values: readonly string[]): Promise<string[]> => {
  const faults: string[] = []
  for (const [at, { who, method, path, body, version }] of cases.entries()) {
    // Guesses are held back, which would leave the rest of the route untried.
    await database().query('UPDATE throttles SET failures = 0, blockedUntil = NULL')
    for (const [index, text] of values.entries()) {
      const bodies = bodiesWith(body as Json, text)
      const raw = bodies[(at + index * 7) % bodies.length]
      const call = who[method](path).type('json')
      if (version !== undefined) void call.set('If-Match', `"${version}"`)
      const { status } = await call.send(raw)
      if (status >= 500)
        faults.push(`${status} ${method} ${path} ${text.slice(0, 40)} in ${raw?.slice(0, 200)}`)
    }
  }
  return faults
}

const nest = (depth: number) => `${'['.repeat(depth)}${']'.repeat(depth)}`
const nestOfObjects = (depth: number) => `${'{"a":'.repeat(depth)}1${'}'.repeat(depth)}`

describe('hostile input at the routes of the assessment', () => {
  it('is never answered with 5xx', { timeout: 120_000 }, async () => {
    expect(await faultsOf(await scene(), hostile)).toEqual([])
  })
})

describe('an id in an address of the assessment', () => {
  const ids = [
    '0',
    '1abc',
    'a%00b',
    '%F0%9F%98%80',
    '%ED%A0%80',
    "'%20OR%201=1--",
    'x'.repeat(3000),
    '-'.repeat(36),
  ]

  it('that is none is answered like one that is absent', { timeout: 60_000 }, async () => {
    const { child, therapist, asCarer, asTeacher } = await askingScene()
    const answered = new Set<number>()
    for (const id of ids)
      for (const [who, path] of [
        [therapist, `/api/children/${child.id}/measures/${id}`],
        [therapist, `/api/children/${child.id}/histories/${id}`],
        [therapist, `/api/children/${child.id}/questionnaires/${id}`],
        [therapist, `/api/children/${child.id}/conclusions/${id}`],
        [therapist, `/api/children/${id}/hand-profile`],
        [asCarer, ownPage(child, id)],
        [asTeacher, pupilPage(child, id)],
      ] as const) {
        const version = ['If-Match', '"1"'] as const
        for (const call of [
          who.get(path),
          who
            .put(path)
            .set(...version)
            .send({ answers: someAnswers(), comment: null }),
          who
            .post(`${path}/send`)
            .set(...version)
            .send({}),
          who
            .post(`${path}/lock`)
            .set(...version)
            .send({}),
          who
            .post(`${path}/sign`)
            .set(...version)
            .send({ confirmed: true }),
          who.delete(path).set(...version),
        ])
          answered.add((await call).status)
      }
    // 400 where the address is no text at all, 422 where the body is looked at first.
    expect([...answered].sort()).toEqual([400, 404, 422])
  })

  it('that is none is answered like one that is absent where the clinic asks', async () => {
    const { child, therapist } = await askingScene()
    for (const id of ids) {
      const answers = [
        await therapist
          .post(requestsPath(child, `/${id}/cancel`))
          .set('If-Match', '"1"')
          .send({}),
        await therapist.post(requestsPath(child, `/${id}/remind`)).send({}),
        await therapist.post(`/api/children/${child.id}/alerts/${id}/action`).send({ action: 'Called them' }),
      ]
      for (const { status } of answers) expect([400, 404]).toContain(status)
    }
  })
})

describe('a body', () => {
  const send = (raw: string) => client().post('/api/answer-links/open').type('json').send(raw)

  it.each([
    ['nested 21 deep', nest(21), 413],
    ['nested 20 deep', nest(20), 422],
    ['nested 30,000 deep in lists', nest(30_000), 413],
    ['nested 20,000 deep in objects', nestOfObjects(20_000), 413],
    ['of 1001 members', JSON.stringify(Array.from({ length: 1001 }, () => 0)), 413],
    ['of 1000 members', JSON.stringify(Array.from({ length: 1000 }, () => 0)), 422],
  ])('%s is answered in time and by name', async (_what, raw, status) => {
    expect((await send(raw)).status).toBe(status)
  })
})
