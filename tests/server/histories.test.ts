import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { AnswerRequest } from '../../server/entities/AnswerRequest.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import type { AlertView } from '../../shared/alerts.ts'
import { emptyHistory, type HistoryDetails, type HistoryView } from '../../shared/histories.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { buildHistory, historyDetails } from '../support/histories.ts'
import { insertRow } from '../support/insertRow.ts'

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
  child = await buildChild({ therapist, birthDate: '2018-05-04' })
  await giveConsent(child, 'assessment_treatment', therapist)
})

const at = (path = '', of: Pick<Child, 'id'> = child) => `/api/children/${of.id}/histories${path}`
const discard = (id: string, version: number) => anna.delete(at(`/${id}`)).set('If-Match', `"${version}"`)
const start = { respondentName: 'Mother', answeredOn: '2026-06-09', replacesId: null }
const begun = async (given: object = {}): Promise<HistoryView> => {
  const response = await anna.post(at()).send({ ...start, ...given })
  expect(response.status, response.text).toBe(201)
  return response.body
}
const save = (id: string, version: number, details: Partial<HistoryDetails>, more: object = {}) =>
  anna
    .put(at(`/${id}`))
    .set('If-Match', `"${version}"`)
    .send({ respondentName: 'Mother', answeredOn: '2026-06-09', details: historyDetails(details), ...more })
const lock = (id: string, version: number) =>
  anna
    .post(at(`/${id}/lock`))
    .set('If-Match', `"${version}"`)
    .send({})
const alerts = async (): Promise<AlertView[]> =>
  (await anna.get(`/api/children/${child.id}/alerts`)).body.rows

describe('a history', () => {
  it('is begun empty, saved as it is told, and closed with what is still missing', async () => {
    const fresh = await begun()
    expect(fresh).toMatchObject({
      informant: 'therapist',
      respondentName: 'Mother',
      version: 1,
      lockedAt: null,
      correctedUntilMonths: 24,
      can: { change: true, lock: true, discard: true, replace: false },
    })
    expect(fresh.details).toEqual(emptyHistory)
    expect(fresh.missing).toContain('family.mother')

    const told = {
      enjoys: 'Building dens',
      pain: 0,
      family: { ...emptyHistory.family, mother: 'left' },
    } as const
    const saved = await save(fresh.id, 1, told)
    expect([saved.status, saved.body.version]).toEqual([200, 2])
    expect(saved.body.details).toEqual(historyDetails(told))
    expect(saved.body.missing).not.toContain('family.mother')
    // A zero is an answer; what was not asked stays open.
    expect(saved.body.missing).not.toContain('pain')
    expect(saved.body.missing).toContain('tremor')

    const closed = await lock(fresh.id, 2)
    expect(closed.body).toMatchObject({
      lockedAt: '2026-06-10T09:00:00.000Z',
      lockedBy: 'Adaeze Nwosu-Reid',
      can: { change: false, lock: false, replace: true },
    })
    expect(closed.body.missing).toContain('tremor')
    expect((await anna.get(at())).body.map(({ id }: HistoryView) => id)).toEqual([fresh.id])
    expect(await alerts()).toEqual([])
  })

  it('is not closed without what the child enjoys', async () => {
    const { id } = await begun()
    const refused = await lock(id, 1)
    expect([refused.status, Object.keys(refused.body.fields)]).toEqual([422, ['details.enjoys']])
    expect((await anna.get(at(`/${id}`))).body.lockedAt).toBeNull()
  })

  it.each([
    ['weeks that cannot be', { gestationWeeks: 21 }, 'details.gestationWeeks'],
    ['months beyond 14 years', { firstNoticedMonths: 169 }, 'details.firstNoticedMonths'],
    ['pain beyond the scale', { pain: 11 }, 'details.pain'],
    ['text for a number', { pain: '3' }, 'details.pain'],
    ['an answer nobody offers', { tremor: 'maybe' }, 'details.tremor'],
    ['a day to come', { handChangedOn: '2026-06-11' }, 'details.handChangedOn'],
    ['a day before birth', { injuryOn: '2018-05-03' }, 'details.injuryOn'],
    ['a hand nobody has', { family: { ...emptyHistory.family, mother: 'foot' } }, 'details.family.mother'],
  ])('names the field when it has %s, and keeps what was saved', async (_what, given, field) => {
    const { id } = await begun()
    const refused = await save(id, 1, given as Partial<HistoryDetails>)
    expect([refused.status, Object.keys(refused.body.fields)]).toEqual([422, [field]])
    expect((await anna.get(at(`/${id}`))).body).toMatchObject({ version: 1, details: emptyHistory })
  })

  it('takes no field of its own, and no day it cannot have been told', async () => {
    const { id } = await begun()
    const own = await save(id, 1, {}, { lockedAt: '2026-06-10T09:00:00Z' })
    expect(own.status).toBe(422)
    for (const answeredOn of ['2026-06-11', '2018-05-03']) {
      const refused = await save(id, 1, {}, { answeredOn })
      expect([refused.status, Object.keys(refused.body.fields)]).toEqual([422, ['answeredOn']])
      expect((await anna.post(at()).send({ ...start, answeredOn })).status).toBe(422)
    }
  })

  it('answers a stale save with what is stored, and a missing version with 428', async () => {
    const { id } = await begun()
    await save(id, 1, { enjoys: 'Building dens' })
    const late = await save(id, 1, { enjoys: 'Swimming' })
    expect([late.status, late.body.code, late.body.current.details.enjoys]).toEqual([
      409,
      'stale',
      'Building dens',
    ])
    const without = await anna.put(at(`/${id}`)).send({ ...start, details: emptyHistory })
    expect(without.status).toBe(428)
  })

  it('never changes once closed, by the rule and by the database itself', async () => {
    const { id } = await buildHistory(child, therapist, { locked: true, details: { enjoys: 'Dens' } })
    expect((await save(id, 1, { enjoys: 'Other' })).body.code).toBe('closed')
    expect((await lock(id, 1)).body.code).toBe('closed')
    expect((await discard(id, 1)).body.code).toBe('closed')
    for (const attempt of [
      "UPDATE histories SET details = '{}' WHERE id = ?",
      'DELETE FROM histories WHERE id = ?',
    ])
      await expect(database().query(attempt, [id])).rejects.toThrow(/history that was sent is closed/)
    expect((await anna.get(at(`/${id}`))).body.details.enjoys).toBe('Dens')
  })

  it('is replaced once by a newer one that starts with its answers', async () => {
    const earlier = await buildHistory(child, therapist, { locked: true, details: { enjoys: 'Dens' } })
    const newer = await begun({ replacesId: earlier.id })
    expect(newer).toMatchObject({ replacesId: earlier.id, details: { enjoys: 'Dens' } })
    expect((await anna.get(at(`/${earlier.id}`))).body).toMatchObject({
      replacedById: newer.id,
      can: { replace: false },
    })
    expect((await anna.post(at()).send({ ...start, replacesId: earlier.id })).body.code).toBe('duplicate')
    expect((await anna.post(at()).send({ ...start, replacesId: newer.id })).body.code).toBe('not_locked')
    expect((await anna.post(at()).send({ ...start, replacesId: randomUUID() })).status).toBe(404)
  })

  it('is begun once for one key, and thrown away while it is open', async () => {
    const key = randomUUID()
    const twice = await Promise.all([1, 2].map(() => anna.post(at()).set('Idempotency-Key', key).send(start)))
    expect(twice[0]?.body.id).toBe(twice[1]?.body.id)
    expect((await discard(twice[0]?.body.id, 1)).status).toBe(204)
    expect((await anna.get(at())).body).toEqual([])
  })

  it('is not thrown away from a page older than what a colleague wrote', async () => {
    const { id } = await begun()
    await save(id, 1, { pain: 1 })
    expect((await anna.delete(at(`/${id}`))).status).toBe(428)
    const stale = await discard(id, 1)
    expect([stale.status, stale.body.code, stale.body.current.details.pain]).toEqual([409, 'stale', 1])
  })

  it('needs consent to assessment in force', async () => {
    const without = await buildChild({ therapist })
    const refused = await anna.post(at('', without)).send(start)
    expect([refused.status, refused.body.code]).toEqual([409, 'consent_needed'])
  })

  it('that a family is still answering is read, and left to the family', async () => {
    const carer = await buildGuardian(child, null, { name: 'Maren Holt' })
    const { id } = await buildHistory(child, therapist, {
      locked: false,
      informant: 'guardian',
      guardianId: carer.id,
      respondentName: null,
      startedById: null,
    })
    const seen = (await anna.get(at(`/${id}`))).body
    expect([seen.respondentName, seen.can]).toEqual([
      'Maren Holt',
      { change: false, lock: false, discard: false, replace: false },
    ])
    for (const refused of [await save(id, 1, { pain: 1 }), await lock(id, 1), await discard(id, 1)])
      expect([refused.status, refused.body.code]).toEqual([409, 'family_answers'])
  })

  it('of a family is theirs while it is asked for, and can only be discarded once the request was withdrawn', async () => {
    const carer = await buildGuardian(child)
    const request = await insertRow(AnswerRequest, {
      id: randomUUID(),
      childId: child.id,
      asks: 'history',
      formId: null,
      answerer: 'guardian',
      guardianId: carer.id,
      teacherId: null,
      tokenHash: null,
      askedAt: new Date('2026-06-09T09:00:00Z'),
      askedById: therapist.id,
      expiresAt: new Date('2099-06-29T09:00:00Z'),
    })
    const { id } = await buildHistory(child, therapist, {
      locked: false,
      informant: 'guardian',
      guardianId: carer.id,
      requestId: request.id,
      startedById: null,
    })
    const seen = async () => (await anna.get(at(`/${id}`))).body
    expect([(await seen()).leftOver, (await seen()).can.discard]).toEqual([false, false])
    expect((await discard(id, 1)).body.code).toBe('family_answers')
    const ended = ['UPDATE answer_requests SET cancelledAt = NOW() WHERE id = ?', [request.id]] as const
    await database().query(ended[0], [...ended[1]])
    expect(await seen()).toMatchObject({
      leftOver: true,
      can: { change: false, lock: false, discard: true, replace: false },
    })
    for (const refused of [await save(id, 1, { pain: 1 }), await lock(id, 1)])
      expect([refused.status, refused.body.code]).toEqual([409, 'request_ended'])
    expect((await discard(id, 1)).status).toBe(204)
    const [trail] = await database().query(
      "SELECT relation, actorId FROM audit_entries WHERE objectId = ? AND action = 'history.discarded'",
      [id],
    )
    expect(trail).toEqual({ relation: 'assignedTherapist', actorId: therapist.id })
  })
})

describe('who may see and write histories', () => {
  it('lets the lead read and refuses the lead’s writing', async () => {
    const { id } = await begun()
    const lead = await signedInAs(await buildUser('clinicLead'))
    expect((await lead.get(at(`/${id}`))).body.can).toEqual({
      change: false,
      lock: false,
      discard: false,
      replace: false,
    })
    expect((await lead.post(at()).send(start)).status).toBe(403)
    expect((await lead.delete(at(`/${id}`))).status).toBe(403)
  })

  it('looks like nothing to everybody else, and behind another child’s address', async () => {
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
      for (const path of ['', `/${id}`])
        expect((await client.get(at(path))).status, `${other.roles[0]} ${path}`).toBe(404)
    }
    const second = await buildChild({ therapist })
    expect((await anna.get(at(`/${id}`, second))).status).toBe(404)
    expect((await anna.delete(at(`/${id}`, second)).set('If-Match', '"1"')).status).toBe(404)
  })
})

describe('the corrected age at the head of the record', () => {
  it('stands for a young child born early, by the newest history, until the clinic’s limit', async () => {
    const young = await buildChild({ therapist, birthDate: '2025-06-10' })
    const head = async () => (await anna.get(`/api/children/${young.id}`)).body.correctedAge
    expect(await head()).toBeNull()
    await buildHistory(young, therapist, {
      locked: true,
      answeredOn: '2026-01-05',
      details: { gestationWeeks: 28 },
    })
    // 365 days less 84 are 281: 40 weeks.
    expect(await head()).toBe('40 weeks corrected (born at 28 weeks)')
    await buildHistory(young, therapist, {
      locked: false,
      answeredOn: '2026-02-05',
      details: { gestationWeeks: 32 },
    })
    expect(await head()).toBe('44 weeks corrected (born at 32 weeks)')
    await buildHistory(child, therapist, { locked: true, details: { gestationWeeks: 28 } })
    expect((await anna.get(`/api/children/${child.id}`)).body.correctedAge).toBeNull()
  })
})
