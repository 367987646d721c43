import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import type { GoalDetails, GoalRating, GoalsView, GoalView } from '../../shared/goals.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'

let therapist: User
let anna: Client
let child: Child

beforeAll(async () => {
  await startApp()
  setClock(() => new Date('2026-06-10T09:00:00Z'))
  therapist = await buildUser('therapist', { displayName: 'Adaeze Nwosu-Reid' })
  anna = await signedInAs(therapist)
})
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

beforeEach(async () => {
  child = await buildChild({ therapist, writingHand: 'left' })
  await giveConsent(child, 'assessment_treatment', therapist)
})

const at = (path = '', of: Pick<Child, 'id'> = child) => `/api/children/${of.id}/goals${path}`

const goal = (given: Partial<GoalDetails> = {}): GoalDetails => ({
  activity: 'Writes a shopping list that a friend can read',
  childVoice: 'I want others to read my list',
  levels: [
    'One word can be read',
    'Half of the words can be read',
    'Most words can be read',
    'Every word can be read',
    'Every word can be read, and it is done in five minutes',
  ],
  baseline: -1,
  importance: 3,
  difficulty: 2,
  targetOn: '2026-09-01',
  ...given,
})
const rating = (given: Partial<GoalRating> = {}): GoalRating => ({
  level: 0,
  ratedOn: '2026-06-10',
  note: null,
  ...given,
})
const set = async (given: Partial<GoalDetails> = {}): Promise<GoalView> => {
  const response = await anna.post(at()).send(goal(given))
  expect(response.status, response.text).toBe(201)
  return response.body
}
const rate = (id: string, given: Partial<GoalRating> = {}) =>
  anna.post(at(`/${id}/ratings`)).send(rating(given))
const end = (id: string, given: object = {}, by = anna) =>
  by.post(at(`/${id}/end`)).send({ outcome: 'finished', reason: 'Reached and kept for a month', ...given })
const goals = async (): Promise<GoalsView> => (await anna.get(at())).body

describe('a goal', () => {
  it('is set, rated again and again, and ended with how and why', async () => {
    const fresh = await set()
    expect(fresh).toMatchObject({
      ...goal(),
      setOn: '2026-06-10',
      ratings: [],
      latestLevel: null,
      endedOn: null,
      can: { change: true, rate: true },
    })
    await rate(fresh.id, { level: -1 })
    const rated = await rate(fresh.id, { level: 1, note: 'At the market' })
    expect(rated.status).toBe(201)
    expect(rated.body.ratings).toHaveLength(2)
    expect(rated.body.ratings).toContainEqual({
      level: 1,
      ratedOn: '2026-06-10',
      by: 'Adaeze Nwosu-Reid',
      note: 'At the market',
    })
    expect((await end(fresh.id)).status).toBe(204)
    expect((await goals()).goals[0]).toMatchObject({
      endedOn: '2026-06-10',
      outcome: 'finished',
      endReason: 'Reached and kept for a month',
      can: { change: false, rate: false },
    })
    for (const refused of [await rate(fresh.id), await end(fresh.id)])
      expect([refused.status, refused.body.code]).toEqual([409, 'closed'])
  })

  it('stands at the level of the latest day, whatever the order of typing', async () => {
    const { id } = await set()
    await rate(id, { level: 2 })
    setClock(() => new Date('2026-06-10T09:05:00Z'))
    await database().query('UPDATE goals SET setOn = ? WHERE id = ?', ['2026-05-01', id])
    const later = await rate(id, { level: -2, ratedOn: '2026-05-20' })
    expect(later.body.latestLevel).toBe(2)
    expect(later.body.ratings.map((one: GoalRating) => one.ratedOn)).toEqual(['2026-05-20', '2026-06-10'])
    setClock(() => new Date('2026-06-10T09:00:00Z'))
  })

  // The clinic's check values for the erratum form of the T-score: weights 6, 4, 2; (-1,-1,-2) is 34.6, (0,+1,0) is 54.4.
  it('counts with its fellows: T at the start and now', async () => {
    const first = await set({ importance: 3, difficulty: 2, baseline: -1 })
    const second = await set({
      importance: 2,
      difficulty: 2,
      baseline: -1,
      activity: 'Cuts along a line at school',
    })
    const third = await set({
      importance: 2,
      difficulty: 1,
      baseline: -2,
      activity: 'Opens the lunch box alone',
    })
    expect(await goals()).toMatchObject({ baselineScore: null, score: null, scored: 0 })
    await rate(first.id, { level: 0 })
    await rate(second.id, { level: 1 })
    await rate(third.id, { level: 0 })
    const { baselineScore, score, scored } = await goals()
    expect(baselineScore).toBeCloseTo(34.6, 1)
    expect(score).toBeCloseTo(54.4, 1)
    expect(scored).toBe(3)
    await end(third.id, { outcome: 'set_aside' })
    expect((await goals()).scored).toBe(2)
  })

  it.each([
    ['a change of hand', { activity: 'Switches to the right hand for writing' }, 'activity'],
    [
      'writing with the other hand',
      { activity: 'Writes the date with the right hand every morning' },
      'activity',
    ],
    [
      'a change of hand in a level',
      { levels: goal().levels.with(4, 'Has become right-handed in class') },
      'levels[4]',
    ],
    [
      'two levels that say the same',
      { levels: goal().levels.with(3, 'Most words can be READ.') },
      'levels[3]',
    ],
    ['a level left out', { levels: goal().levels.slice(0, 4) }, 'levels'],
    ['an empty level', { levels: goal().levels.with(1, '  ') }, 'levels[1]'],
    ['no word of the child', { childVoice: ' ' }, 'childVoice'],
    ['a start that is no start', { baseline: 0 }, 'baseline'],
    ['a target day gone by', { targetOn: '2026-06-10' }, 'targetOn'],
    ['a target day that cannot be', { targetOn: '2026-09-31' }, 'targetOn'],
    ['importance beyond the scale', { importance: 4 }, 'importance'],
    ['an owner of its own', { setById: randomUUID() }, 'form'],
  ])('is refused beside the field for %s', async (_what, given, field) => {
    const refused = await anna.post(at()).send({ ...goal(), ...given })
    expect([refused.status, refused.body.code]).toEqual([422, 'invalid'])
    expect(Object.keys(refused.body.fields)).toContain(field)
    expect((await goals()).goals).toEqual([])
  })

  it('may give the other hand its helper’s job, and any hand while none is settled', async () => {
    await set({ activity: 'Holds the page with the right hand while writing' })
    await database().query("UPDATE children SET writingHand = 'swaps' WHERE id = ?", [child.id])
    await set({ activity: 'Writes the date with the right hand or the left' })
    expect((await goals()).goals).toHaveLength(2)
  })

  it('is one of four at most, also when two are set at once', async () => {
    const three = ['first', 'second', 'third']
    for (const activity of three) await set({ activity: `Does the ${activity} thing alone` })
    const answers = await Promise.all(
      [1, 2, 3].map((n) => anna.post(at()).send(goal({ activity: `Does thing ${n} alone` }))),
    )
    expect(answers.map((answer) => answer.status).toSorted()).toEqual([201, 409, 409])
    expect(answers.find((answer) => answer.status === 409)?.body.code).toBe('too_many_goals')
    const { goals: open } = await goals()
    await end(open[0]?.id ?? '')
    await set({ activity: 'Does one more thing alone' })
  })

  it('is set once for one key, and rated once for one key', async () => {
    const key = randomUUID()
    const twice = await Promise.all(
      [1, 2].map(() => anna.post(at()).set('Idempotency-Key', key).send(goal())),
    )
    expect(twice[0]?.body.id).toBe(twice[1]?.body.id)
    const other = randomUUID()
    for (let time = 0; time < 2; time += 1)
      await anna
        .post(at(`/${twice[0]?.body.id}/ratings`))
        .set('Idempotency-Key', other)
        .send(rating())
    expect((await goals()).goals.map((one) => one.ratings.length)).toEqual([1])
  })

  it('needs consent to therapy in force', async () => {
    const without = await buildChild({ therapist })
    const refused = await anna.post(at('', without)).send(goal())
    expect([refused.status, refused.body.code]).toEqual([409, 'consent_needed'])
  })
})

describe('a rating', () => {
  it.each([
    ['a level beyond the scale', { level: 3 }, 'level'],
    ['half a level', { level: 0.5 }, 'level'],
    ['a day to come', { ratedOn: '2026-06-11' }, 'ratedOn'],
    ['a day before the goal was set', { ratedOn: '2026-06-09' }, 'ratedOn'],
  ])('is refused beside the field for %s', async (_what, given, field) => {
    const { id } = await set()
    const refused = await rate(id, given)
    expect([refused.status, Object.keys(refused.body.fields)]).toEqual([422, [field]])
  })

  it('is never changed or removed in the database by the running server', async () => {
    const { id } = await set()
    await rate(id)
    for (const attempt of [
      'UPDATE goal_ratings SET level = 2 WHERE goalId = ?',
      'DELETE FROM goal_ratings WHERE goalId = ?',
    ])
      await expect(database().query(attempt, [id])).rejects.toThrow()
  })
})

describe('ending a goal', () => {
  it('asks how and why, and heeds a stated version', async () => {
    const { id } = await set()
    expect((await end(id, { outcome: 'failed' })).body.fields.outcome).toBeDefined()
    expect((await end(id, { reason: ' ' })).body.fields.reason).toBeDefined()
    const stale = await end(id).set('If-Match', '"7"')
    expect([stale.status, stale.body.code, stale.body.current.version]).toEqual([409, 'stale', 1])
    expect((await end(id).set('If-Match', '"1"')).status).toBe(204)
  })

  it('has one winner when it is pressed twice at once', async () => {
    const { id } = await set()
    const answers = await Promise.all([end(id), end(id, { outcome: 'set_aside' })])
    expect(answers.map((answer) => answer.status).toSorted()).toEqual([204, 409])
  })
})

describe('who may see and change goals', () => {
  it('lets the clinic lead read and refuses the lead’s changes', async () => {
    const { id } = await set()
    const lead = await signedInAs(await buildUser('clinicLead'))
    const shown: GoalsView = (await lead.get(at())).body
    expect([shown.can.add, shown.goals[0]?.can]).toEqual([false, { change: false, rate: false }])
    const attempts = [
      lead.post(at()).send(goal()),
      lead.post(at(`/${id}/ratings`)).send(rating()),
      end(id, {}, lead),
    ]
    for (const attempt of attempts) expect((await attempt).status).toBe(403)
  })

  it('looks like nothing to everybody else', async () => {
    const { id } = await set()
    const teacher = await buildUser('teacher')
    const schoolClass = await buildClass(teacher)
    await database().query('UPDATE children SET schoolClassId = ? WHERE id = ?', [schoolClass.id, child.id])
    await giveConsent(child, 'share_school_seating', therapist)
    const mother = await buildUser('guardian')
    await buildGuardian(child, mother)
    for (const other of [await buildUser('therapist'), await buildUser('administrator'), teacher, mother]) {
      const client = await signedInAs(other)
      const answers = [
        await client.get(at()),
        await client.post(at()).send(goal()),
        await client.post(at(`/${id}/ratings`)).send(rating()),
        await end(id, {}, client),
      ]
      for (const answer of answers)
        expect([answer.status, answer.body.code], other.roles[0]).toEqual([404, 'not_found'])
    }
  })

  it('finds a goal only under its own child', async () => {
    const { id } = await set()
    const other = await buildChild({ therapist })
    expect((await anna.post(at(`/${id}/ratings`, other)).send(rating())).status).toBe(404)
    expect(
      (await anna.post(at(`/${id}/end`, other)).send({ outcome: 'finished', reason: 'Crossed' })).status,
    ).toBe(404)
    expect((await goals()).goals[0]).toMatchObject({ ratings: [], endedOn: null })
  })

  it('leaves an audit entry for each act', async () => {
    const { id } = await set()
    await rate(id)
    await goals()
    await end(id)
    const entries = (await database().query(
      'SELECT action FROM audit_entries WHERE childId = ? ORDER BY position',
      [child.id],
    )) as { action: string }[]
    expect(entries.map((entry) => entry.action)).toEqual([
      'goal.created',
      'goal.rated',
      'goals.list',
      'goal.ended',
    ])
  })
})
