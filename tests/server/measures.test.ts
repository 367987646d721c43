import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import { fromJson, selectOne } from '../../server/queries/sql.ts'
import type { MeasureStart } from '../../shared/measureSchemas.ts'
import type { MeasureDetails, MeasureView, ReachingDetails, SkillDetails } from '../../shared/measures.ts'
import { reachOrder } from '../../shared/reaching.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { pegsDetails, trial } from '../support/measures.ts'
import { questionsIn, statementsOf } from '../support/queries.ts'

let therapist: User
let colleague: User
let anna: Client
let ben: Client
let child: Child

beforeAll(async () => {
  await startApp()
  setClock(() => new Date('2026-06-10T09:00:00Z'))
  therapist = await buildUser('therapist', { displayName: 'Adaeze Nwosu-Reid' })
  anna = await signedInAs(therapist)
  colleague = await buildUser('therapist', { displayName: 'Benedikt Larsson-Vale' })
  ben = await signedInAs(colleague)
})
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

beforeEach(async () => {
  child = await buildChild({ therapist, birthDate: '2018-05-04' })
  await giveConsent(child, 'assessment_treatment', therapist)
})

const at = (path = '', of: Pick<Child, 'id'> = child) => `/api/children/${of.id}/measures${path}`
const discard = (id: string, version: number) => anna.delete(at(`/${id}`)).set('If-Match', `"${version}"`)
const start = (given: Partial<MeasureStart> = {}): MeasureStart => ({
  kind: 'reaching',
  measuredOn: '2026-06-09',
  replacesId: null,
  ...given,
})
const begun = async (given: Partial<MeasureStart> = {}): Promise<MeasureView> => {
  const response = await anna.post(at()).send(start(given))
  expect(response.status, response.text).toBe(201)
  return response.body
}
const draft = (details: object, more: object = {}) => ({
  measuredOn: '2026-06-09',
  details,
  notDoneReason: null,
  comment: null,
  ...more,
})
const put = (id: string, version: number, body: object, who: Client = anna) =>
  who
    .put(at(`/${id}`))
    .set('If-Match', `"${version}"`)
    .send(body)
const lock = (id: string, version: number, who: Client = anna) =>
  who
    .post(at(`/${id}/lock`))
    .set('If-Match', `"${version}"`)
    .send({})
const fields = (response: { status: number; body: { fields?: object } }) => [
  response.status,
  Object.keys(response.body.fields ?? {}),
]
const ofReaching = ({ details }: MeasureView) => details as ReachingDetails

/** Left for the near side and the middle, then fewer and fewer: 15 left and 6 right of 21 (check value CARD-01). */
const reached = (details: ReachingDetails): ReachingDetails => {
  const left = [3, 3, 3, 3, 2, 1, 0]
  const used = new Map<number, number>()
  const reaches = reachOrder(details.seed, details.cardsPerPlace).map((place) => {
    const times = used.get(place) ?? 0
    used.set(place, times + 1)
    return {
      place,
      hand: times < (left[place - 1] ?? 0) ? ('left' as const) : ('right' as const),
      swapped: false,
    }
  })
  return { ...details, reaches }
}
const pegs = pegsDetails([22.1, 21.8, 22.4], [24.9, 24.2, 24.6])
const lockedPegs = async (details: object = pegs): Promise<MeasureView> => {
  const { id } = await begun({ kind: 'pegs' })
  const saved = await put(id, 1, draft(details))
  expect(saved.status, saved.text).toBe(200)
  const response = await lock(id, 2)
  expect(response.status, response.text).toBe(200)
  return response.body
}
const list = async (): Promise<MeasureView[]> => (await anna.get(at())).body
const hold = (of: Pick<Child, 'id'>, by: User) =>
  database().query(
    'INSERT INTO assignments (id, childId, therapistId, startedAt, endedAt, reason) VALUES (?, ?, ?, ?, NULL, ?)',
    [randomUUID(), of.id, by.id, new Date('2026-06-01T09:00:00Z'), 'shared'],
  )

describe('a measure', () => {
  it('of reaching is begun with a drawn order, saved tap by tap, and locked with the score of its raw reaches', async () => {
    const fresh = await begun()
    expect(fresh).toMatchObject({
      kind: 'reaching',
      methodVersion: 'reaching-7.v1',
      version: 1,
      startedBy: 'Adaeze Nwosu-Reid',
      lockedAt: null,
      can: { change: true, lock: true, replace: false },
    })
    const { seed, cardsPerPlace, reaches } = ofReaching(fresh)
    expect([cardsPerPlace, reaches]).toEqual([3, []])
    expect(seed).toBeGreaterThanOrEqual(0)
    expect(seed).toBeLessThan(2 ** 32)

    const whole = reached(ofReaching(fresh))
    const one = { ...whole, reaches: whole.reaches.slice(0, 1) }
    expect((await put(fresh.id, 1, draft(one))).body.version).toBe(2)
    expect(ofReaching((await anna.get(at(`/${fresh.id}`))).body).reaches).toEqual(one.reaches)
    expect((await put(fresh.id, 2, draft(whole, { comment: 'Sat well' }))).status).toBe(200)

    const response = await lock(fresh.id, 3)
    expect(response.body).toMatchObject({
      comment: 'Sat well',
      lockedAt: '2026-06-10T09:00:00.000Z',
      lockedBy: 'Adaeze Nwosu-Reid',
      can: { change: false, lock: false, replace: true },
    })
    const row = await selectOne<{ score: string; methodVersion: string }>(
      'SELECT score, methodVersion FROM measures WHERE id = :id',
      { id: fresh.id },
    )
    const stored = fromJson<MeasureView['score']>(row?.score ?? '')
    expect(row?.methodVersion).toBe('reaching-7.v1')
    expect(stored).toEqual(response.body.score)
    expect(stored).toMatchObject({ left: 15, right: 6, crossing: { count: 3, of: 9 } })
    expect(stored).toHaveProperty('index', expect.closeTo(-42.857142857, 6))
  })

  it('draws another order for each occasion', async () => {
    const seeds = new Set<number>()
    for (const day of ['2026-06-01', '2026-06-02', '2026-06-03', '2026-06-04'])
      seeds.add(ofReaching(await begun({ measuredOn: day })).seed)
    expect(seeds.size).toBe(4)
  })

  it.each([
    ['reaching', { cardsPerPlace: 6 }, { cardsPerPlace: 6 }],
    ['pegs', { startHand: 'right', pegs: 9 }, { startHand: 'right', pegs: 9, seconds: null }],
    ['tapping', { startHand: 'left' }, { startHand: 'left', pegs: null, seconds: 20 }],
    ['dots', {}, { pegs: null, seconds: 20 }],
    ['sides', {}, { eyeFarMetres: null }],
    ['seating', {}, { poplitealCm: null }],
  ] as const)(
    'of %s begins with what was asked for and nothing recorded',
    async (kind, options, expected) => {
      const fresh = await begun({ kind, options })
      expect(fresh.details).toMatchObject({ kind, ...expected })
    },
  )

  it('of pegs keeps an interrupted trial and leaves it out of the stored score', async () => {
    const interrupted = {
      ...pegs,
      trials: [...(pegs as SkillDetails).trials, trial('left', 80, { interrupted: true })],
    }
    const shown = await lockedPegs(interrupted)
    expect((shown.details as SkillDetails).trials).toHaveLength(7)
    expect(shown.score).toMatchObject({ interrupted: 1, left: { trials: 3 }, right: { trials: 3 } })
    // 100 (22.1 − 24.5667)/(22.1 + 24.5667), by hand: the left hand is quicker, so minus.
    expect(shown.score).toHaveProperty('index', expect.closeTo(-5.285714, 5))
  })

  it('asks about an unusual value before it is locked, and takes it once confirmed', async () => {
    const { id } = await begun({ kind: 'pegs' })
    const slip = pegsDetails([22, 21, 3600], [0, 24, 25]) as SkillDetails
    expect((await put(id, 1, draft(slip))).status).toBe(200)
    expect(fields(await lock(id, 2))).toEqual([422, ['details.trials[2].value', 'details.trials[3].value']])
    const answered = {
      ...slip,
      trials: slip.trials.map((one, index) =>
        index === 2 ? { ...one, interrupted: true } : index === 3 ? { ...one, confirmed: true } : one,
      ),
    }
    expect((await put(id, 2, draft(answered))).status).toBe(200)
    expect((await lock(id, 3)).body.score).toMatchObject({ left: { trials: 2 }, right: { trials: 3 } })
  })

  it('may be marked as not done with a reason, but not as done with nothing recorded', async () => {
    const { id, details } = await begun()
    expect(fields(await lock(id, 1))).toEqual([422, ['details']])
    const lost = reached(details as ReachingDetails).reaches.map((reach) => ({ ...reach, hand: null }))
    await put(id, 1, draft({ ...details, reaches: lost }))
    expect(fields(await lock(id, 2))).toEqual([422, ['details']])
    await put(id, 2, draft(details, { notDoneReason: 'Tired today' }))
    const response = await lock(id, 3)
    expect(response.body).toMatchObject({
      notDoneReason: 'Tired today',
      score: { index: null, chance: null },
    })
  })

  it('is not “not done” when something was recorded', async () => {
    const { id } = await begun({ kind: 'pegs' })
    await put(id, 1, draft(pegs, { notDoneReason: 'Tired today' }))
    expect(fields(await lock(id, 2))).toEqual([422, ['notDoneReason']])
  })

  it('that is locked is neither saved, locked again nor discarded, by the server or in the database', async () => {
    const { id, version } = await lockedPegs()
    const refused = [await put(id, version, draft(pegs)), await lock(id, version), await discard(id, version)]
    expect(refused.map((answer) => [answer.status, answer.body.code])).toEqual(Array(3).fill([409, 'closed']))
    for (const attempt of [
      "UPDATE measures SET comment = 'x' WHERE id = ?",
      'DELETE FROM measures WHERE id = ?',
    ])
      await expect(database().query(attempt, [id])).rejects.toThrow(/closed/)
  })

  it('that is locked is corrected by a new version, which begins with what it holds and names it', async () => {
    const old = await lockedPegs()
    const again = await begun({ kind: 'pegs', replacesId: old.id, measuredOn: old.measuredOn })
    expect(again).toMatchObject({ replacesId: old.id, details: old.details, lockedAt: null, version: 1 })
    const shown = await list()
    expect(shown.find(({ id }) => id === old.id)).toMatchObject({
      replacedById: again.id,
      can: { change: false, lock: false, replace: false },
    })
    const second = await anna
      .post(at())
      .send(start({ kind: 'pegs', replacesId: old.id, measuredOn: '2026-06-08' }))
    expect([second.status, second.body.code]).toEqual([409, 'duplicate'])
  })

  it('replaces only a locked measure of its own kind and child', async () => {
    const open = await begun({ kind: 'pegs', measuredOn: '2026-06-01' })
    const wrong = await anna.post(at()).send(start({ kind: 'pegs', replacesId: open.id }))
    expect([wrong.status, wrong.body.code]).toEqual([409, 'not_locked'])
    const old = await lockedPegs()
    expect(fields(await anna.post(at()).send(start({ kind: 'dots', replacesId: old.id })))).toEqual([
      422,
      ['replacesId'],
    ])
    const other = await buildChild({ therapist })
    await giveConsent(other, 'assessment_treatment', therapist)
    expect((await anna.post(at('', other)).send(start({ kind: 'pegs', replacesId: old.id }))).status).toBe(
      404,
    )
  })

  it('that was begun and never locked can be discarded', async () => {
    const { id } = await begun()
    expect((await discard(id, 1)).status).toBe(204)
    expect(await list()).toEqual([])
  })

  it('is not discarded from a page older than what a colleague recorded', async () => {
    const { id } = await begun({ kind: 'pegs' })
    await put(id, 1, draft(pegs))
    expect((await anna.delete(at(`/${id}`))).status).toBe(428)
    const stale = await discard(id, 1)
    expect([stale.status, stale.body.code, stale.body.current.version]).toEqual([409, 'stale', 2])
    expect((await list()).map((measure) => measure.id)).toEqual([id])
  })

  it('is made once for one key', async () => {
    const key = randomUUID()
    const twice = await Promise.all(
      [1, 2].map(() => anna.post(at()).set('Idempotency-Key', key).send(start())),
    )
    expect(twice.map((answer) => answer.status)).toEqual([201, 201])
    expect(twice[0]?.body.id).toBe(twice[1]?.body.id)
    expect(await list()).toHaveLength(1)
  })

  it('is listed with the newest occasion first, in one query of its own', async () => {
    const older = await begun({ kind: 'pegs', measuredOn: '2026-01-15' })
    const newer = await begun({ kind: 'dots' })
    let shown: MeasureView[] = []
    const statements = await statementsOf(async () => {
      shown = await list()
    })
    expect(shown.map(({ id }) => id)).toEqual([newer.id, older.id])
    expect(questionsIn(statements).filter((question) => question.includes('FROM measures'))).toHaveLength(1)
  })
})

describe('two people at one occasion', () => {
  beforeEach(() => hold(child, colleague))

  it('are told when both begin the same part for the same day, whoever is first', async () => {
    const both = await Promise.all([anna, ben].map((who) => who.post(at()).send(start())))
    expect(both.map((answer) => answer.status).sort()).toEqual([201, 409])
    const first = both.find((answer) => answer.status === 201)?.body as MeasureView
    const told = both.find((answer) => answer.status === 409)?.body
    expect(told.code).toBe('duplicate')
    expect(told.message).toContain(
      `Reaching across the midline of 9 Jun 2026 was already begun by ${first.startedBy}`,
    )
    expect((await ben.post(at()).send(start({ kind: 'tapping' }))).status).toBe(201)
  })

  it('do not write over each other: the second learns what the first recorded', async () => {
    const { id, details } = await begun()
    const whole = reached(details as ReachingDetails)
    const upTo = (n: number) => draft({ ...whole, reaches: whole.reaches.slice(0, n) })
    expect((await put(id, 1, upTo(3))).status).toBe(200)
    const late = await put(id, 1, upTo(2), ben)
    expect([late.status, late.body.code]).toEqual([409, 'stale'])
    expect(late.body.current).toMatchObject({ id, version: 2 })
    expect(late.body.current.details.reaches).toHaveLength(3)
    const lateLock = await lock(id, 1, ben)
    expect([lateLock.status, lateLock.body.code]).toEqual([409, 'stale'])
  })

  it('save at the same moment: one is kept, the other is told', async () => {
    const { id, details } = await begun()
    const whole = reached(details as ReachingDetails)
    const both = await Promise.all(
      [anna, ben].map((who, index) =>
        put(id, 1, draft({ ...whole, reaches: whole.reaches.slice(0, index + 1) }), who),
      ),
    )
    expect(both.map((answer) => answer.status).sort()).toEqual([200, 409])
    expect((await anna.get(at(`/${id}`))).body.version).toBe(2)
  })

  it('may not move an open measure onto a day that has another open one of its kind', async () => {
    const first = await begun({ kind: 'pegs', measuredOn: '2026-06-08' })
    const second = await begun({ kind: 'pegs' })
    const moved = draft(second.details, { measuredOn: '2026-06-08' })
    const refused = await put(second.id, 1, moved)
    expect([refused.status, refused.body.fields.measuredOn]).toEqual([
      422,
      `Moving pegs of 8 Jun 2026 was begun by ${first.startedBy} and is open. Choose another day, or go on there.`,
    ])
    expect((await anna.get(at(`/${second.id}`))).body).toMatchObject({ measuredOn: '2026-06-09', version: 1 })
    // A free day is fine, and so is the same one again.
    expect((await put(second.id, 1, draft(second.details, { measuredOn: '2026-06-07' }))).status).toBe(200)
    expect((await put(second.id, 2, draft(second.details, { measuredOn: '2026-06-07' }))).status).toBe(200)
    // Two that move onto one free day at once: one does.
    const both = await Promise.all([
      put(first.id, 1, draft(first.details, { measuredOn: '2026-06-05' })),
      put(second.id, 3, draft(second.details, { measuredOn: '2026-06-05' }), ben),
    ])
    expect(both.map(({ status }) => status).sort()).toEqual([200, 422])
  })
})

describe('skill on the other side than the writing hand', () => {
  const alerts = () =>
    database().query('SELECT flag, text, origin, originId, actedAt FROM alerts WHERE childId = ?', [
      child.id,
    ]) as Promise<{ flag: string; text: string; origin: string; originId: string }[]>
  const writes = (hand: string | null) =>
    database().query('UPDATE children SET writingHand = ? WHERE id = ?', [hand, child.id])
  /** The right hand is quicker by far more than the trials differ among themselves. */
  const rightQuicker = pegsDetails([30.1, 30.4, 29.9], [20.2, 20.0, 20.3])

  it('asks for a full look once the measure is locked, and names the task', async () => {
    await writes('left')
    const { id } = await begun({ kind: 'pegs' })
    await put(id, 1, draft(rightQuicker))
    expect(await alerts()).toEqual([])
    expect((await lock(id, 2)).status).toBe(200)
    const raised = await alerts()
    expect(raised).toEqual([expect.objectContaining({ origin: 'measure', originId: id })])
    const [trail] = await database().query(
      "SELECT relation FROM audit_entries WHERE childId = ? AND action = 'alert.raised'",
      [child.id],
    )
    expect(trail.relation).toBe('assignedTherapist')
    expect(raised[0]?.text).toContain('the right hand did clearly better at: Moving pegs')
  })

  const lockedCounts = async (kind: 'tapping' | 'dots', measuredOn?: string) => {
    const { id, details } = await begun({ kind, ...(measuredOn !== undefined && { measuredOn }) })
    const trials = [30, 31, 30]
      .map((n) => trial('left', n))
      .concat([50, 51, 50].map((n) => trial('right', n)))
    const given = { ...draft({ ...details, trials }), ...(measuredOn !== undefined && { measuredOn }) }
    expect((await put(id, 1, given)).status).toBe(200)
    expect((await lock(id, 2)).status).toBe(200)
  }

  it('asks for nothing by dots or by tapping alone, and for a look once the two agree', async () => {
    await writes('left')
    await lockedCounts('dots')
    expect(await alerts()).toEqual([])
    await lockedCounts('tapping')
    const [raised, ...more] = await alerts()
    expect(more).toEqual([])
    expect(raised?.text).toMatch(/right hand did clearly better at: Tapping, .*[Dd]ots/)
  })

  it('does not take two tasks together that lie more than half a year apart', async () => {
    await writes('left')
    await lockedCounts('dots', '2025-06-09')
    await lockedCounts('tapping')
    expect(await alerts()).toEqual([])
  })

  it('does not bring back what was acted on when a task of another result is locked', async () => {
    await writes('left')
    await lockedPegs(rightQuicker)
    await database().query('UPDATE alerts SET actedAt = ?, actedById = ?, action = ? WHERE childId = ?', [
      new Date(),
      therapist.id,
      'Full look planned',
      child.id,
    ])
    const { id, details } = await begun({ kind: 'dots' })
    const trials = [30, 35, 32].flatMap((n) => [trial('left', n), trial('right', n + 1)])
    await put(id, 1, draft({ ...details, trials }))
    expect((await lock(id, 2)).status).toBe(200)
    expect(await alerts()).toHaveLength(1)
  })

  it('adds a second task to the sign that stands already', async () => {
    await writes('left')
    await lockedPegs(rightQuicker)
    await lockedCounts('tapping')
    const raised = await alerts()
    expect(raised).toHaveLength(1)
    expect(raised[0]?.text).toMatch(/Moving pegs\. Reported since: .*: Moving pegs, Tapping[^.]*\.$/)
  })

  it.each([
    ['the same hand writes', 'right', rightQuicker],
    ['the writing hand is not known', null, rightQuicker],
    ['the hands differ no more than their trials', 'left', pegsDetails([22, 26, 24], [23, 25, 22])],
    ['there is one trial a hand and no interval', 'left', pegsDetails([30], [20])],
    ['there are two trials a hand', 'left', pegsDetails([30.1, 30.2], [20.2, 20.3])],
  ])('asks for nothing when %s', async (_when, hand, details) => {
    await writes(hand)
    await lockedPegs(details)
    expect(await alerts()).toEqual([])
  })
})

describe('bad input', () => {
  it.each([
    ['an unknown kind', { kind: 'strength' }, ['kind']],
    ['a day to come', { measuredOn: '2026-06-11' }, ['measuredOn']],
    ['a day before birth', { measuredOn: '2018-05-03' }, ['measuredOn']],
    ['four cards a place', { options: { cardsPerPlace: 4 } }, ['options.cardsPerPlace']],
    ['a seed of its own', { options: { seed: 1 } }, ['options']],
    ['text for a number', { kind: 'pegs', options: { pegs: '10' } }, ['options.pegs']],
    ['a field of its own', { startedById: randomUUID() }, ['form']],
  ])('names the field when a measure begins with %s', async (_what, given, expected) => {
    expect(fields(await anna.post(at()).send({ ...start(), ...given }))).toEqual([422, expected])
    expect(await list()).toEqual([])
  })

  it.each<[string, MeasureStart['kind'], (details: MeasureDetails) => unknown, string[]]>([
    ['no details', 'reaching', () => null, ['details']],
    ['another kind', 'reaching', () => pegs, ['details']],
    ['another seed', 'reaching', (d) => ({ ...d, seed: 5 }), ['details']],
    ['other cards', 'reaching', (d) => ({ ...d, cardsPerPlace: 6 }), ['details']],
    [
      'a reach out of order',
      'reaching',
      (d) => {
        const whole = reached(d as ReachingDetails)
        const [first, ...rest] = whole.reaches
        return { ...whole, reaches: [{ ...first, place: (first!.place % 7) + 1 }, ...rest] }
      },
      ['details.reaches[0].place'],
    ],
    [
      'more reaches than cards',
      'reaching',
      (d) => {
        const whole = reached(d as ReachingDetails)
        return { ...whole, reaches: [...whole.reaches, whole.reaches[0]] }
      },
      ['details.reaches[21].place'],
    ],
    [
      'a lost card that changed hands',
      'reaching',
      (d) => {
        const whole = reached(d as ReachingDetails)
        return { ...whole, reaches: [{ ...whole.reaches[0], hand: null, swapped: true }] }
      },
      ['details.reaches[0]'],
    ],
    ['a time below 0', 'pegs', () => pegsDetails([-1], [2]), ['details.trials[0].value']],
    [
      'a time that is text',
      'pegs',
      () => ({ ...pegs, trials: [{ ...trial('left', 1), value: '1' }] }),
      ['details.trials[0].value'],
    ],
    ['half a tap', 'tapping', (d) => ({ ...d, trials: [trial('left', 40.5)] }), ['details.trials[0].value']],
    ['a score of its own', 'dots', (d) => ({ ...d, index: 100 }), ['details']],
    [
      'two tries',
      'sides',
      (d) => ({ ...d, eye: { far: ['left', 'left'], near: [null, null, null] } }),
      ['details.eye.far'],
    ],
    ['a knee nobody has', 'seating', (d) => ({ ...d, poplitealCm: 350 }), ['details.poplitealCm']],
    [
      'a shoulder below the elbow',
      'seating',
      (d) => ({ ...d, elbowHeightCm: 22, shoulderHeightCm: 21 }),
      ['details.shoulderHeightCm'],
    ],
  ])('names the field when saved with %s, and loses nothing', async (_what, kind, given, expected) => {
    const { id, details } = await begun({ kind })
    expect(fields(await put(id, 1, draft(given(details) as object)))).toEqual([422, expected])
    expect((await anna.get(at(`/${id}`))).body).toMatchObject({ version: 1, details })
  })

  it('names the field when saved with a day to come or a reason too long', async () => {
    const { id, details } = await begun()
    expect(fields(await put(id, 1, draft(details, { measuredOn: '2026-06-11' })))).toEqual([
      422,
      ['measuredOn'],
    ])
    expect(fields(await put(id, 1, draft(details, { notDoneReason: 'x'.repeat(301) })))).toEqual([
      422,
      ['notDoneReason'],
    ])
  })

  it('is refused when it does not say which version it was made from', async () => {
    const { id, details } = await begun()
    expect((await anna.put(at(`/${id}`)).send(draft(details))).status).toBe(428)
    expect((await anna.post(at(`/${id}/lock`)).send({})).status).toBe(428)
  })
})

describe('who may see and take measures', () => {
  it('needs consent to assessment in force, to begin and to lock', async () => {
    const without = await buildChild({ therapist })
    const refused = await anna.post(at('', without)).send(start())
    expect([refused.status, refused.body.code]).toEqual([409, 'consent_needed'])
    const { id } = await begun({ kind: 'pegs' })
    await put(id, 1, draft(pegs))
    const given = await selectOne<{ id: string }>('SELECT id FROM consents WHERE childId = :childId', {
      childId: child.id,
    })
    await giveConsent(child, 'assessment_treatment', therapist, {
      kind: 'withdrawn',
      withdrawsId: given?.id ?? null,
    })
    const late = await lock(id, 2)
    expect([late.status, late.body.code]).toEqual([409, 'consent_needed'])
  })

  it('lets the clinic lead read, and refuses the lead’s taking', async () => {
    const { id } = await begun()
    const lead = await signedInAs(await buildUser('clinicLead'))
    expect((await lead.get(at())).body).toHaveLength(1)
    expect((await lead.get(at(`/${id}`))).body.can).toEqual({ change: false, lock: false, replace: false })
    const refused = [
      await lead.post(at()).send(start({ kind: 'dots' })),
      await put(id, 1, draft(pegs), lead),
      await lock(id, 1, lead),
      await lead.delete(at(`/${id}`)),
    ]
    expect(refused.map((answer) => answer.status)).toEqual([403, 403, 403, 403])
  })

  it('looks like nothing to everybody else', async () => {
    const { id } = await begun()
    const mother = await buildUser('guardian')
    await buildGuardian(child, mother)
    for (const other of [
      await buildUser('therapist'),
      await buildUser('administrator'),
      await buildUser('teacher'),
      mother,
    ]) {
      const client = await signedInAs(other)
      const answers = [
        await client.get(at()),
        await client.get(at(`/${id}`)),
        await client.post(at()).send(start({ kind: 'dots' })),
        await put(id, 1, draft(pegs), client),
        await lock(id, 1, client),
        await client.delete(at(`/${id}`)),
      ]
      for (const answer of answers)
        expect([answer.status, answer.body.code], other.roles[0]).toEqual([404, 'not_found'])
    }
    expect((await list()).map(({ version }) => version)).toEqual([1])
  })

  it('finds a measure only under its own child', async () => {
    const { id } = await begun()
    const other = await buildChild({ therapist })
    await giveConsent(other, 'assessment_treatment', therapist)
    const away = (path: string) => at(path, other)
    const answers = [
      await anna.get(away(`/${id}`)),
      await anna
        .put(away(`/${id}`))
        .set('If-Match', '"1"')
        .send(draft(pegs)),
      await anna
        .post(away(`/${id}/lock`))
        .set('If-Match', '"1"')
        .send({}),
      await anna.delete(away(`/${id}`)).set('If-Match', '"1"'),
      await anna.get(at('/not-an-id')),
    ]
    expect(answers.map((answer) => answer.status)).toEqual([404, 404, 404, 404, 404])
  })

  it('leaves an audit entry for each step, with the relation used', async () => {
    const { id } = await lockedPegs()
    await anna.get(at(`/${id}`))
    await list()
    const entries = (await database().query(
      'SELECT action, relation, actorId FROM audit_entries WHERE childId = ? ORDER BY position',
      [child.id],
    )) as { action: string; relation: string; actorId: string }[]
    expect(entries.map((entry) => entry.action)).toEqual([
      'measure.started',
      'measure.changed',
      'measure.locked',
      'measure.read',
      'measures.list',
    ])
    expect(new Set(entries.map((entry) => `${entry.relation} ${entry.actorId}`))).toEqual(
      new Set([`assignedTherapist ${therapist.id}`]),
    )
  })
})
