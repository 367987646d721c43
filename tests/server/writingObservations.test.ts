import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import type { WritingObservationDetails, WritingObservationView } from '../../shared/writingObservations.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'

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

const at = (of: Pick<Child, 'id'> = child) => `/api/children/${of.id}/writing-observations`

const seen = (given: Partial<WritingObservationDetails> = {}): WritingObservationDetails => ({
  observedOn: '2026-06-09',
  writingHand: 'left',
  paperOffsetCm: -6,
  paperTiltDegrees: 25,
  otherHandSteadies: 'partly',
  wristPosture: 'below_line',
  wristExtensionDegrees: -10,
  grip: 'dynamic_tripod',
  fingerToTipMm: 28.5,
  pressure: 'medium',
  minutesWritten: 10,
  painBefore: 0,
  painAfter: 2,
  deskType: 'double',
  elbowClash: 'yes',
  leftClearanceCm: 35,
  lightSide: 'left',
  feetFlat: 'yes',
  deskAboveElbowCm: 3,
  note: null,
  ...given,
})
const nothing: WritingObservationDetails = {
  ...(Object.fromEntries(
    Object.keys(seen()).map((key) => [key, null]),
  ) as unknown as WritingObservationDetails),
  observedOn: '2026-06-09',
}
const list = async (): Promise<WritingObservationView[]> => (await anna.get(at())).body

describe('a writing observation', () => {
  it('is kept as seen, by whom and when, and listed with the newest day first', async () => {
    const older = await anna.post(at()).send(seen({ observedOn: '2026-01-15' }))
    expect(older.status).toBe(201)
    const newer = await anna.post(at()).send(seen())
    expect(newer.body).toEqual({
      ...seen(),
      id: newer.body.id,
      observedBy: 'Adaeze Nwosu-Reid',
      recordedAt: '2026-06-10T09:00:00.000Z',
    })
    expect((await list()).map(({ id }) => id)).toEqual([newer.body.id, older.body.id])
  })

  it('keeps a zero as a zero and what was not looked at as nothing', async () => {
    const { body } = await anna.post(at()).send({ ...nothing, painBefore: 0, paperTiltDegrees: 0 })
    expect(body).toMatchObject({ painBefore: 0, paperTiltDegrees: 0, painAfter: null, grip: null })
  })

  it('of before wrist and minutes were asked for reads as not looked at', async () => {
    const { wristExtensionDegrees: _wrist, minutesWritten: _minutes, ...before } = seen()
    expect((await anna.post(at()).send(before)).body).toEqual(
      expect.objectContaining({ wristExtensionDegrees: null, minutesWritten: null }),
    )
    await database().query(
      `INSERT INTO writing_observations (id, childId, observedOn, details, observedById, recordedAt)
       VALUES (?, ?, '2026-01-15', ?, ?, '2026-01-15 10:00:00')`,
      [randomUUID(), child.id, JSON.stringify({ ...before, observedOn: '2026-01-15' }), therapist.id],
    )
    expect((await list())[1]).toEqual(
      expect.objectContaining({
        observedOn: '2026-01-15',
        wristExtensionDegrees: null,
        minutesWritten: null,
      }),
    )
  })

  it('needs at least one thing that was seen', async () => {
    const refused = await anna.post(at()).send(nothing)
    expect([refused.status, Object.keys(refused.body.fields)]).toEqual([422, ['form']])
  })

  it.each([
    ['a tilt that cannot be', { paperTiltDegrees: 61 }, 'paperTiltDegrees'],
    ['a wrist that cannot be', { wristExtensionDegrees: -41 }, 'wristExtensionDegrees'],
    ['no minutes', { minutesWritten: 0 }, 'minutesWritten'],
    ['pain beyond the scale', { painAfter: 11 }, 'painAfter'],
    ['a grip nobody knows', { grip: 'left' }, 'grip'],
    ['text for a number', { leftClearanceCm: '40' }, 'leftClearanceCm'],
    ['a day to come', { observedOn: '2026-06-11' }, 'observedOn'],
    ['a day before birth', { observedOn: '2018-05-03' }, 'observedOn'],
    ['a field of its own', { observedById: randomUUID() }, 'form'],
  ])('names the field when it has %s', async (_what, given, field) => {
    const refused = await anna.post(at()).send({ ...seen(), ...given })
    expect([refused.status, Object.keys(refused.body.fields)]).toEqual([422, [field]])
    expect(await list()).toEqual([])
  })

  it('is made once for one key', async () => {
    const key = randomUUID()
    const twice = await Promise.all(
      [1, 2].map(() => anna.post(at()).set('Idempotency-Key', key).send(seen())),
    )
    expect(twice[0]?.body.id).toBe(twice[1]?.body.id)
    expect(await list()).toHaveLength(1)
  })

  it('is never changed or removed in the database by the running server', async () => {
    const { body } = await anna.post(at()).send(seen())
    for (const attempt of [
      "UPDATE writing_observations SET details = '{}' WHERE id = ?",
      'DELETE FROM writing_observations WHERE id = ?',
    ])
      await expect(database().query(attempt, [body.id])).rejects.toThrow()
    expect(await list()).toHaveLength(1)
  })

  it('needs consent to assessment in force', async () => {
    const without = await buildChild({ therapist })
    const refused = await anna.post(at(without)).send(seen())
    expect([refused.status, refused.body.code]).toEqual([409, 'consent_needed'])
  })
})

describe('who may see and add observations', () => {
  it('lets the clinic lead read and refuses the lead’s adding', async () => {
    await anna.post(at()).send(seen())
    const lead = await signedInAs(await buildUser('clinicLead'))
    expect((await lead.get(at())).body).toHaveLength(1)
    expect((await lead.post(at()).send(seen())).status).toBe(403)
  })

  it('looks like nothing to everybody else', async () => {
    const mother = await buildUser('guardian')
    await buildGuardian(child, mother)
    for (const other of [
      await buildUser('therapist'),
      await buildUser('administrator'),
      await buildUser('teacher'),
      mother,
    ]) {
      const client = await signedInAs(other)
      for (const answer of [await client.get(at()), await client.post(at()).send(seen())])
        expect([answer.status, answer.body.code], other.roles[0]).toEqual([404, 'not_found'])
    }
    expect(await list()).toEqual([])
  })
})
