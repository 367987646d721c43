import { randomUUID } from 'node:crypto'
import express from 'express'
import request from 'supertest'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { AnswerRequest } from '../../server/entities/AnswerRequest.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import { errorHandler } from '../../server/middleware/errorHandler.ts'
import { requestContext } from '../../server/middleware/requestContext.ts'
import { fromJson, selectOne } from '../../server/queries/sql.ts'
import { handUseFormV1, type HandUseAnswer } from '../../shared/handUse.ts'
import type { HandProfileView } from '../../shared/handProfile.ts'
import type { QuestionnaireView } from '../../shared/questionnaires.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { buildQuestionnaire } from '../support/records.ts'

beforeAll(startApp)
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

let therapist: User
let child: Child
let anna: Client

beforeAll(async () => {
  setClock(() => new Date('2026-06-10T09:00:00Z'))
  therapist = await buildUser('therapist', { displayName: 'Adaeze Nwosu-Reid' })
  anna = await signedInAs(therapist)
})

beforeEach(async () => {
  child = await buildChild({ therapist })
  await giveConsent(child, 'assessment_treatment', therapist)
})

const at = (path = '', of: Pick<Child, 'id'> = child) => `/api/children/${of.id}/questionnaires${path}`
const discard = (id: string, version: number) => anna.delete(at(`/${id}`)).set('If-Match', `"${version}"`)
const start = {
  formId: 'hand-use-10.v1',
  informant: 'guardian',
  respondentName: 'Mother',
  answeredOn: '2026-06-09',
  replacesId: null,
}

const answersOf = (given: (HandUseAnswer | null)[]) =>
  Object.fromEntries(handUseFormV1.items.map((item, index) => [item.id, given[index] ?? null]))
const draft = (given: (HandUseAnswer | null)[], more: object = {}) => ({
  informant: 'guardian',
  respondentName: 'Mother',
  answeredOn: '2026-06-09',
  answers: answersOf(given),
  cutOffSet: 'clinic-40',
  comment: null,
  ...more,
})
/** Six strong left, three left, one either: right 1 and left 16 points, quotient -88.2 (the clinic's check value). */
const settled: HandUseAnswer[] = [...Array(6).fill('strong_left'), ...Array(3).fill('left'), 'either']

const begun = async (more: object = {}): Promise<QuestionnaireView> => {
  const response = await anna.post(at()).send({ ...start, ...more })
  expect(response.status, response.text).toBe(201)
  return response.body
}
const saved = async (
  id: string,
  given: (HandUseAnswer | null)[] = settled,
  more: object = {},
  version = 1,
) => {
  const response = await anna
    .put(at(`/${id}`))
    .set('If-Match', `"${version}"`)
    .send(draft(given, more))
  expect(response.status, response.text).toBe(200)
  return response.body as QuestionnaireView
}
const lock = (id: string, version: number) =>
  anna
    .post(at(`/${id}/lock`))
    .set('If-Match', `"${version}"`)
    .send({})
const locked = async (
  given: (HandUseAnswer | null)[] = settled,
  more: object = {},
  startMore: object = {},
) => {
  const { id } = await begun(startMore)
  const { version } = await saved(id, given, more)
  const response = await lock(id, version)
  expect(response.status, response.text).toBe(200)
  return response.body as QuestionnaireView
}
const profile = async (): Promise<HandProfileView> =>
  (await anna.get(`/api/children/${child.id}/hand-profile`)).body

describe('a hand-use questionnaire', () => {
  it('is begun without answers under the clinic’s cut-offs, saved, locked with its score, and shown on the line', async () => {
    const fresh = await begun()
    expect(fresh).toMatchObject({
      form: { id: 'hand-use-10.v1', key: 'hand-use-10', edition: 1, retiredAt: null },
      cutOffSet: 'clinic-40',
      version: 1,
      lockedAt: null,
      can: { change: true, lock: true, discard: true, replace: false },
    })
    expect(Object.values(fresh.answers)).toEqual(Array(10).fill(null))
    expect(fresh.score).toMatchObject({ answered: 0, unanswered: 10, quotient: null, direction: null })

    const kept = await saved(fresh.id, settled, { comment: 'Shown with real objects' })
    expect(kept.version).toBe(2)
    expect(kept.score.quotient).toBeCloseTo(-88.2, 1)
    expect((await profile()).lateralLine).toEqual([])

    const response = await lock(fresh.id, 2)
    expect(response.body).toMatchObject({
      lockedAt: '2026-06-10T09:00:00.000Z',
      lockedBy: 'Adaeze Nwosu-Reid',
      can: { change: false, lock: false, replace: true },
    })
    const shown = await profile()
    expect(shown.blocked).toBeNull()
    expect(shown.can).toEqual({ add: true })
    expect(shown.lateralLine).toHaveLength(1)
    expect(shown.lateralLine[0]).toMatchObject({
      id: fresh.id,
      occasion: '2026-06-09',
      basis: '10 of 10 activities answered',
      caution: null,
      cutOffs: { left: -40, right: 40, inclusive: true },
      informant: 'Parent or carer',
      latest: true,
    })
    expect(shown.lateralLine[0]?.value).toBeCloseTo(-88.2, 1)
  })

  it('stores the score that the server computed, with the cut-offs that were named', async () => {
    const { id } = await locked(settled, { cutOffSet: 'sixty' })
    const row = await selectOne<{ score: string }>(
      'SELECT score FROM questionnaire_responses WHERE id = :id',
      { id },
    )
    const stored = fromJson<QuestionnaireView['score']>(row?.score ?? '')
    expect(stored.quotient).toBeCloseTo((100 * (1 - 16)) / 17, 9)
    expect(stored).toMatchObject({
      left: 16,
      right: 1,
      answered: 10,
      standing: 'scorable',
      direction: 'left',
      cutOffs: { id: 'sixty', left: -60, right: 60 },
    })
  })

  // Quotients by hand from the published formula 100 (R - L) / (R + L).
  it.each([
    [
      'left and right mixed',
      [
        'strong_left',
        'strong_left',
        'left',
        'left',
        'either',
        'either',
        'right',
        'right',
        'strong_right',
        'left',
      ],
      -20,
      null,
    ],
    [
      'eight answered',
      [
        'strong_left',
        'strong_left',
        'strong_left',
        'left',
        'either',
        null,
        'does_not_do',
        'left',
        'right',
        'left',
      ],
      -200 / 3,
      null,
    ],
    ['ten times either', Array(10).fill('either'), 0, null],
    [
      'six answered',
      [...Array(3).fill('left'), 'either', 'either', 'right', ...Array(4).fill('does_not_do')],
      -25,
      /^Provisional/,
    ],
    ['five answered', [...Array(5).fill('left'), ...Array(5).fill('does_not_do')], null, /^Not scorable/],
    ['ten times does not do', Array(10).fill('does_not_do'), null, /^Not scorable/],
  ] as [string, (HandUseAnswer | null)[], number | null, RegExp | null][])(
    'is scored and qualified: %s',
    async (_what, given, quotient, caution) => {
      const { score } = await locked(given)
      if (quotient === null) expect(score.quotient).toBeNull()
      else expect(score.quotient).toBeCloseTo(quotient, 9)
      const [row] = (await profile()).lateralLine
      expect(row?.value).toBe(score.quotient)
      if (caution) expect(row?.caution).toMatch(caution)
      else expect(row?.caution).toBeNull()
    },
  )

  it.each([
    ['a quotient of its own', { quotient: 100 }],
    ['a score of its own', { score: { quotient: 100 } }],
    ['a lock', { lockedAt: '2026-06-10T09:00:00Z' }],
    ['a version', { version: 7 }],
  ])('refuses a browser that sends %s', async (_what, more) => {
    const { id } = await begun()
    const response = await anna
      .put(at(`/${id}`))
      .set('If-Match', '"1"')
      .send(draft(settled, more))
    expect(response.status).toBe(422)
    expect(JSON.stringify(response.body.fields)).toContain(Object.keys(more)[0])
    expect((await anna.get(at(`/${id}`))).body).toMatchObject({ version: 1, score: { quotient: null } })
  })

  it.each([
    ['an answer that is none', { answers: { ...answersOf(settled), throws: 'both' } }, 'answers.throws'],
    [
      'an activity of another form',
      { answers: { ...answersOf(settled), juggles: 'left' } },
      'answers.juggles',
    ],
    ['an activity left out', { answers: {} }, 'answers.throws'],
    ['cut-offs nobody knows', { cutOffSet: 'mine' }, 'cutOffSet'],
    ['a day that cannot be', { answeredOn: '2026-02-30' }, 'answeredOn'],
    ['a day to come', { answeredOn: '2026-06-11' }, 'answeredOn'],
    ['a day before birth', { answeredOn: '2017-01-01' }, 'answeredOn'],
    ['a comment that is too long', { comment: 'x'.repeat(1001) }, 'comment'],
  ])('names the field when a draft has %s', async (_what, more, field) => {
    const { id } = await begun()
    const response = await anna
      .put(at(`/${id}`))
      .set('If-Match', '"1"')
      .send(draft(settled, more))
    expect(response.status).toBe(422)
    expect(Object.keys(response.body.fields)).toContain(field)
  })

  it('cannot be locked with nothing answered', async () => {
    const { id } = await begun()
    const response = await lock(id, 1)
    expect(response.status).toBe(422)
    expect(response.body.fields.answers).toMatch(/does not do this yet/i)
    expect((await anna.get(at(`/${id}`))).body.lockedAt).toBeNull()
  })

  it('is closed once locked: by the rule and by the database itself', async () => {
    const { id, version } = await locked()
    const put = await anna
      .put(at(`/${id}`))
      .set('If-Match', `"${version}"`)
      .send(draft(Array(10).fill('right')))
    expect([put.status, put.body.code]).toEqual([409, 'closed'])
    expect((await lock(id, version)).body.code).toBe('closed')
    expect((await discard(id, version)).body.code).toBe('closed')
    await expect(
      database().query("UPDATE questionnaire_responses SET comment = 'x' WHERE id = ?", [id]),
    ).rejects.toThrow(/locked response is closed/)
    await expect(database().query('DELETE FROM questionnaire_responses WHERE id = ?', [id])).rejects.toThrow(
      /locked response is closed/,
    )
    expect((await anna.get(at(`/${id}`))).body.score.quotient).toBeCloseTo(-88.2, 1)
  })

  it('is answered as closed, not as a fault, should ever only the trigger stand in the way', async () => {
    const { id } = await locked()
    const bare = express()
    bare.use(requestContext)
    bare.get('/', async () => {
      await database().query("UPDATE questionnaire_responses SET comment = 'x' WHERE id = ?", [id])
    })
    bare.use(errorHandler)
    const response = await request(bare).get('/')
    expect([response.status, response.body.code]).toEqual([409, 'closed'])
  })

  it('is corrected by a new response that names the old one, which leaves the line once the new one is locked', async () => {
    const old = await locked()
    const newer = await begun({ replacesId: old.id })
    expect((await profile()).lateralLine.map((row) => row.id)).toEqual([old.id])
    expect((await anna.get(at(`/${old.id}`))).body).toMatchObject({
      replacedById: newer.id,
      can: { replace: false },
    })
    const again = await anna.post(at()).send({ ...start, replacesId: old.id })
    expect([again.status, again.body.code]).toEqual([409, 'duplicate'])

    const { version } = await saved(newer.id, Array(10).fill('right'))
    await lock(newer.id, version)
    const { lateralLine, questionnaires } = await profile()
    expect(lateralLine.map((row) => [row.id, row.value])).toEqual([[newer.id, 100]])
    expect(questionnaires.map((response) => response.id).toSorted()).toEqual([old.id, newer.id].toSorted())
  })

  it('lets only locked responses of the same child be replaced', async () => {
    const open = await begun()
    expect((await anna.post(at()).send({ ...start, replacesId: open.id })).body.code).toBe('not_locked')
    const other = await buildChild({ therapist })
    await giveConsent(other, 'assessment_treatment', therapist)
    const theirs = await locked()
    expect((await anna.post(at('', other)).send({ ...start, replacesId: theirs.id })).status).toBe(404)
  })

  it('is discarded without a trace on the page while it is unlocked', async () => {
    const { id } = await begun()
    expect((await discard(id, 1)).status).toBe(204)
    expect((await anna.get(at(`/${id}`))).status).toBe(404)
    expect((await profile()).questionnaires).toEqual([])
  })

  it('is not discarded from a page older than what a colleague answered', async () => {
    const { id } = await begun()
    const { version } = await saved(id)
    expect((await anna.delete(at(`/${id}`))).status).toBe(428)
    const stale = await discard(id, 1)
    expect([stale.status, stale.body.code, stale.body.current.version]).toEqual([409, 'stale', version])
  })

  it('shows the newest occasion as the latest and keeps the earlier one', async () => {
    const old = await locked(settled, { answeredOn: '2025-06-01' })
    const now = await locked(settled)
    expect((await profile()).lateralLine.map((row) => [row.id, row.latest])).toEqual([
      [now.id, true],
      [old.id, false],
    ])
  })

  it('is begun once when the same request comes twice', async () => {
    const key = randomUUID()
    const twice = await Promise.all([1, 2].map(() => anna.post(at()).set('Idempotency-Key', key).send(start)))
    expect(twice.map((response) => response.status)).toEqual([201, 201])
    expect(twice[0]?.body.id).toBe(twice[1]?.body.id)
    expect((await profile()).questionnaires).toHaveLength(1)
  })
})

describe('answers that somebody was asked for', () => {
  it('are seen by the therapist while they come in, and are left to the person who was asked', async () => {
    const guardian = await buildGuardian(child)
    const requestId = randomUUID()
    await database().manager.insert(AnswerRequest, {
      id: requestId,
      childId: child.id,
      asks: 'questionnaire',
      formId: 'hand-use-10.v1',
      answerer: 'guardian',
      guardianId: guardian.id,
      teacherId: null,
      tokenHash: null,
      askedAt: new Date('2026-06-01T09:00:00Z'),
      askedById: therapist.id,
      expiresAt: new Date('2026-06-29T09:00:00Z'),
    })
    const { id, version } = await buildQuestionnaire(child, therapist, {
      locked: false,
      requestId,
      guardianId: guardian.id,
      informant: 'guardian',
      startedById: null,
    })
    expect((await anna.get(at(`/${id}`))).body).toMatchObject({
      requestId,
      can: { change: false, lock: false, discard: false, replace: false },
    })
    const tried = [
      await anna
        .put(at(`/${id}`))
        .set('If-Match', `"${version}"`)
        .send(draft(settled)),
      await lock(id, version),
      await discard(id, version),
    ]
    expect(tried.map(({ status, body }) => [status, body.code])).toEqual(Array(3).fill([409, 'asked']))
    expect((await anna.get(at(`/${id}`))).body.version).toBe(version)
  })

  it.each([
    ['was withdrawn', { cancelledAt: new Date('2026-06-02T09:00:00Z') }],
    ['ran out', { expiresAt: new Date('2026-06-02T09:00:00Z') }],
  ])('can only be discarded, by the therapist, once the request %s', async (_how, ended) => {
    const guardian = await buildGuardian(child)
    const requestId = randomUUID()
    await database().manager.insert(AnswerRequest, {
      id: requestId,
      childId: child.id,
      asks: 'questionnaire',
      formId: 'hand-use-10.v1',
      answerer: 'guardian',
      guardianId: guardian.id,
      teacherId: null,
      tokenHash: null,
      askedAt: new Date('2026-06-01T09:00:00Z'),
      askedById: therapist.id,
      expiresAt: new Date('2026-06-29T09:00:00Z'),
      ...ended,
    })
    const { id, version } = await buildQuestionnaire(child, therapist, {
      locked: false,
      requestId,
      guardianId: guardian.id,
      informant: 'guardian',
      startedById: null,
    })
    expect((await anna.get(at(`/${id}`))).body).toMatchObject({
      leftOver: true,
      can: { change: false, lock: false, discard: true, replace: false },
    })
    const saved = await anna
      .put(at(`/${id}`))
      .set('If-Match', `"${version}"`)
      .send(draft(settled))
    const tried = [saved, await lock(id, version)]
    expect(tried.map(({ status, body }) => [status, body.code])).toEqual(
      Array(2).fill([409, 'request_ended']),
    )
    const lead = await signedInAs(await buildUser('clinicLead'))
    expect((await lead.get(at(`/${id}`))).body.can.discard).toBe(false)
    expect((await lead.delete(at(`/${id}`)).set('If-Match', `"${version}"`)).status).toBe(403)
    expect((await discard(id, version + 1)).body.code).toBe('stale')
    expect((await discard(id, version)).status).toBe(204)
    expect((await anna.get(at(`/${id}`))).status).toBe(404)
  })
})

describe('saving a questionnaire', () => {
  it('asks which version a change was made from', async () => {
    const { id } = await begun()
    expect((await anna.put(at(`/${id}`)).send(draft(settled))).status).toBe(428)
    expect((await anna.post(at(`/${id}/lock`)).send({})).status).toBe(428)
  })

  it('answers a stale save with what is stored now, and writes nothing', async () => {
    const { id } = await begun()
    await saved(id, settled, { comment: 'first' })
    const late = await anna
      .put(at(`/${id}`))
      .set('If-Match', '"1"')
      .send(draft(settled, { comment: 'second' }))
    expect([late.status, late.body.code]).toEqual([409, 'stale'])
    expect(late.body.current).toMatchObject({ version: 2, comment: 'first' })
    expect((await lock(id, 1)).body.current).toMatchObject({ version: 2 })
    expect((await anna.get(at(`/${id}`))).body).toMatchObject({
      version: 2,
      comment: 'first',
      lockedAt: null,
    })
  })

  it('has one winner when it is locked twice at once', async () => {
    for (let round = 0; round < 5; round += 1) {
      const { id } = await begun()
      const { version } = await saved(id)
      const answers = await Promise.all([lock(id, version), lock(id, version)])
      expect(answers.map((answer) => answer.status).toSorted()).toEqual([200, 409])
    }
  })
})

describe('consent to assessment', () => {
  it('is needed to begin and to lock, and the page says so', async () => {
    const { id } = await begun()
    const { version } = await saved(id)
    setClock(() => new Date('2026-06-10T09:05:00Z'))
    const [given] = (await database().query('SELECT id FROM consents WHERE childId = ?', [child.id])) as {
      id: string
    }[]
    await giveConsent(child, 'assessment_treatment', therapist, {
      kind: 'withdrawn',
      withdrawsId: given?.id ?? null,
    })

    const refused = await lock(id, version)
    expect([refused.status, refused.body.code]).toEqual([409, 'consent_needed'])
    expect((await anna.post(at()).send(start)).body.code).toBe('consent_needed')
    const shown = await profile()
    expect(shown.blocked).toMatch(/No consent for assessment and therapy is in force/)
    expect(shown.can.add).toBe(false)
    expect(shown.questionnaires).toHaveLength(1)
    setClock(() => new Date('2026-06-10T09:00:00Z'))
  })
})

describe('who may see and change hand-use responses', () => {
  it('lets the clinic lead read, and refuses the lead’s changes', async () => {
    const { id } = await begun()
    const lead = await signedInAs(await buildUser('clinicLead'))
    const seen = await lead.get(at(`/${id}`))
    expect(seen.body.can).toEqual({ change: false, lock: false, discard: false, replace: false })
    expect((await lead.get(`/api/children/${child.id}/hand-profile`)).body.can.add).toBe(false)
    const attempts = [
      lead.post(at()).send(start),
      lead
        .put(at(`/${id}`))
        .set('If-Match', '"1"')
        .send(draft(settled)),
      lead
        .post(at(`/${id}/lock`))
        .set('If-Match', '"1"')
        .send({}),
      lead.delete(at(`/${id}`)),
    ]
    for (const attempt of attempts) expect((await attempt).status).toBe(403)
  })

  it('looks like nothing to everybody else', async () => {
    const { id } = await begun()
    const teacher = await buildUser('teacher')
    const schoolClass = await buildClass(teacher)
    await database().query('UPDATE children SET schoolClassId = ? WHERE id = ?', [schoolClass.id, child.id])
    await giveConsent(child, 'share_school_observation', therapist)
    const mother = await buildUser('guardian')
    await buildGuardian(child, mother)
    const others = [await buildUser('therapist'), await buildUser('administrator'), teacher, mother]
    for (const other of others) {
      const client = await signedInAs(other)
      const absent = await client.get(at(`/${randomUUID()}`))
      const answers = [
        await client.get(`/api/children/${child.id}/hand-profile`),
        await client.get(at(`/${id}`)),
        await client.post(at()).send(start),
        await client
          .put(at(`/${id}`))
          .set('If-Match', '"1"')
          .send(draft(settled)),
        await client
          .post(at(`/${id}/lock`))
          .set('If-Match', '"1"')
          .send({}),
        await client.delete(at(`/${id}`)),
      ]
      for (const answer of answers) {
        expect([answer.status, answer.body.code], `${other.roles[0]}`).toEqual([404, 'not_found'])
        expect(answer.body.message).toBe(absent.body.message)
      }
    }
    expect((await anna.get(at(`/${id}`))).body.version).toBe(1)
  })

  it('finds a response only under its own child', async () => {
    const { id } = await begun()
    const other = await buildChild({ therapist })
    await giveConsent(other, 'assessment_treatment', therapist)
    const answers = [
      await anna.get(at(`/${id}`, other)),
      await anna
        .put(at(`/${id}`, other))
        .set('If-Match', '"1"')
        .send(draft(settled)),
      await anna
        .post(at(`/${id}/lock`, other))
        .set('If-Match', '"1"')
        .send({}),
      await anna.delete(at(`/${id}`, other)).set('If-Match', '"1"'),
      await anna.get(at('/not-an-id')),
    ]
    expect(answers.map((answer) => answer.status)).toEqual([404, 404, 404, 404, 404])
    expect((await anna.get(at(`/${id}`))).body.version).toBe(1)
  })

  it('leaves an audit entry for each step, with the relation used', async () => {
    const { id } = await locked()
    await anna.get(at(`/${id}`))
    await profile()
    const entries = (await database().query(
      'SELECT action, relation, actorId FROM audit_entries WHERE childId = ? ORDER BY position',
      [child.id],
    )) as { action: string; relation: string; actorId: string }[]
    expect(entries.map((entry) => entry.action)).toEqual([
      'questionnaire.started',
      'questionnaire.changed',
      'questionnaire.locked',
      'questionnaire.read',
      'handProfile.read',
    ])
    expect(new Set(entries.map((entry) => `${entry.relation} ${entry.actorId}`))).toEqual(
      new Set([`assignedTherapist ${therapist.id}`]),
    )
  })
})
