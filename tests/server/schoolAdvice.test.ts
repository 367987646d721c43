import { randomUUID } from 'node:crypto'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { addDays } from '../../shared/days.ts'
import type { ChildSchoolView } from '../../shared/schoolAdvice.ts'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Consent } from '../../server/entities/Consent.ts'
import { Goal } from '../../server/entities/Goal.ts'
import { QuestionnaireResponse } from '../../server/entities/QuestionnaireResponse.ts'
import { Referral } from '../../server/entities/Referral.ts'
import { Sample } from '../../server/entities/Sample.ts'
import { SchoolAdvice } from '../../server/entities/SchoolAdvice.ts'
import type { User } from '../../server/entities/User.ts'
import { WritingObservation } from '../../server/entities/WritingObservation.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'

beforeAll(startApp)
afterAll(stopApp)
afterEach(() => setClock(() => new Date('2026-11-20T09:00:00Z')))

const today = '2026-11-20'
let therapist: User
let teacher: User
let anna: Client
let child: Child

beforeAll(async () => {
  setClock(() => new Date('2026-11-20T09:00:00Z'))
  therapist = await buildUser('therapist')
  teacher = await buildUser('teacher', { displayName: 'Greta Fenwick' })
  anna = await signedInAs(therapist)
})
afterAll(() => setClock(() => new Date()))

beforeEach(async () => {
  const schoolClass = await buildClass(teacher, { name: 'Heron' })
  child = await buildChild({ therapist, schoolClassId: schoolClass.id })
})

const at = (path: string, of: Pick<Child, 'id'> = child) => `/api/children/${of.id}${path}`
const seen = async (as = anna): Promise<ChildSchoolView> => {
  const response = await as.get(at('/school'))
  expect(response.status, response.text).toBe(200)
  return response.body
}
const share = () => giveConsent(child, 'share_school_seating', therapist)
const because = 'Two writing elbows meet at this desk.'
const advice = (...itemIds: string[]) => ({
  items: itemIds.map((itemId) => ({ itemId, because })),
  checkBy: '2026-12-18',
})
const publish = (given: object, as = anna) => as.post(at('/advice')).send(given)
const rows = () => database().manager.findBy(SchoolAdvice, { childId: child.id })

const observed = (observedOn: string, details: object) =>
  database().manager.insert(WritingObservation, {
    id: randomUUID(),
    childId: child.id,
    observedOn,
    details: {
      observedOn,
      writingHand: 'left',
      paperOffsetCm: null,
      paperTiltDegrees: null,
      otherHandSteadies: null,
      wristPosture: null,
      grip: null,
      fingerToTipMm: null,
      pressure: null,
      painBefore: null,
      painAfter: null,
      deskType: null,
      elbowClash: null,
      leftClearanceCm: null,
      lightSide: null,
      feetFlat: null,
      deskAboveElbowCm: null,
      note: null,
      ...details,
    },
    observedById: therapist.id,
    recordedAt: new Date(),
  })

const answered = (answeredOn: string, scissors: string, given: Partial<QuestionnaireResponse> = {}) =>
  database().manager.insert(QuestionnaireResponse, {
    id: randomUUID(),
    childId: child.id,
    formVersion: 'hand-use-10.v1',
    informant: 'guardian',
    respondentName: null,
    answeredOn,
    answers: { draws_writes: 'strong_left', scissors },
    comment: null,
    cutOffSet: 'clinic-40',
    score: null,
    lockedAt: new Date(),
    lockedById: therapist.id,
    startedById: therapist.id,
    replacesId: null,
    createdAt: new Date(),
    ...given,
  } as QuestionnaireResponse)

const written = (takenOn: string, smudge: 'none' | 'heavy', given: Partial<Sample> = {}) =>
  database().manager.insert(Sample, {
    id: randomUUID(),
    childId: child.id,
    takenOn,
    details: {
      takenOn,
      task: 'copy',
      script: 'print',
      seconds: null,
      letters: null,
      legibleLetters: null,
      reversals: null,
      smudge,
      lineAdherence: null,
      otherChildVisible: false,
      note: null,
    },
    contentType: 'image/jpeg',
    bytes: 1,
    width: null,
    height: null,
    pixelsPerMm: null,
    sha256: Buffer.alloc(32),
    originalSha256: Buffer.alloc(32),
    content: Buffer.from('x'),
    thumbnail: null,
    uploadedById: therapist.id,
    uploadedAt: new Date(),
    removedAt: null,
    removedById: null,
    ...given,
  })

describe('the advice a record calls for', () => {
  const ids = async () => (await seen()).offered.map((offer) => offer.itemId)

  it('is only what holds for every left-handed writer while nothing else is known', async () => {
    expect(await ids()).toEqual(['X04'])
    expect(await seen()).toMatchObject({
      className: 'Heron',
      school: expect.stringMatching(/^School/),
      teacher: 'Greta Fenwick',
      shared: false,
      published: [],
      can: { publish: false },
    })
  })

  it('follows the newest observation, with the reason from the record and the source of the item', async () => {
    await observed('2026-09-01', { lightSide: 'left', leftClearanceCm: 20 })
    await observed('2026-11-01', { elbowClash: 'yes', leftClearanceCm: 80 })
    expect(await ids()).toEqual(['S01', 'X04'])
    expect((await seen()).offered[0]).toMatchObject({
      triggeredBy: 'because two writing elbows meet at the desk',
      grade: 'Therapists’ or health-service guidance',
      caution: expect.stringContaining('facing the board'),
      source: expect.any(String),
      published: false,
    })
  })

  it('follows the newest locked questionnaire: a begun one and a replaced one do not count', async () => {
    const replaced = randomUUID()
    await answered('2026-10-01', 'right', { id: replaced })
    await answered('2026-09-01', 'left', { replacesId: replaced })
    await answered('2026-11-10', 'right', { lockedAt: null, lockedById: null })
    expect(await ids()).toEqual(['T01', 'T05', 'X04'])
  })

  it('passes over a newer questionnaire that does not ask about cutting', async () => {
    await answered('2026-09-01', 'left')
    await answered('2026-10-01', 'right', {
      formVersion: 'short-4.v1',
      answers: { write: 'strong_left', spoon: 'left' },
    })
    expect(await ids()).toEqual(['T01', 'T05', 'X04'])
  })

  it('follows the newest sample that was not removed', async () => {
    await written('2026-10-01', 'heavy')
    await written('2026-11-01', 'none', { removedAt: new Date(), removedById: therapist.id })
    expect(await ids()).toEqual(['W05', 'T09', 'T10', 'X04'])
    await written('2026-11-05', 'none')
    expect(await ids()).toEqual(['X04'])
  })

  it('hears the concerns of accepted referrals and the open goals', async () => {
    const referral = {
      receivedOn: '2026-06-01',
      givenName: child.givenName,
      familyName: child.familyName,
      birthDate: child.birthDate,
      schoolClassId: null,
      priority: null,
      childId: child.id,
      enteredById: therapist.id,
      decidedById: null,
      decidedAt: null,
      decisionReason: null,
      createdAt: new Date(),
    }
    const withConcern = (concern: string) => ({ concerns: [concern] }) as unknown as Referral['details']
    await database().manager.insert(Referral, {
      ...referral,
      id: randomUUID(),
      status: 'accepted',
      details: withConcern('pressure_to_switch'),
    })
    await database().manager.insert(Referral, {
      ...referral,
      id: randomUUID(),
      status: 'declined',
      details: withConcern('speed'),
    })
    await database().manager.insert(Goal, {
      id: randomUUID(),
      childId: child.id,
      details: {
        activity: 'Writes three lines of a story',
        childVoice: 'I want to write comics',
        levels: ['a', 'b', 'c', 'd', 'e'],
        baseline: -2,
        importance: 2,
        difficulty: 2,
        targetOn: '2027-03-01',
      },
      setOn: today,
      endedOn: null,
      outcome: null,
      setById: therapist.id,
      createdAt: new Date(),
    })
    expect(await ids()).toEqual(['W19', 'H08', 'X04'])
  })

  it('prints for a child who writes in both directions which one an item is for', async () => {
    await database().query("UPDATE children SET scriptDirection = 'both' WHERE id = ?", [child.id])
    await observed('2026-11-01', { paperOffsetCm: 6 })
    await share()
    expect((await publish(advice('W01'))).status).toBe(201)
    const view = await seen()
    const offered = view.offered.find((offer) => offer.itemId === 'W01')
    expect(offered?.caution).toContain('left to right only')
    expect(view.published[0]?.caution).toBe(offered?.caution)
  })
})

describe('giving advice to the school', () => {
  it('needs the family’s consent: 409 and nothing kept without it, given with it', async () => {
    const refused = await publish(advice('S01'))
    expect([refused.status, refused.body.code]).toEqual([409, 'consent_needed'])
    expect(await rows()).toEqual([])
    await giveConsent(child, 'share_school_goals', therapist)
    expect((await publish(advice('S01'))).status).toBe(409)

    await share()
    const given = await publish(advice('S01', 'T05'))
    expect(given.status, given.text).toBe(201)
    expect(given.body.shared).toBe(true)
    expect(given.body.published).toMatchObject([
      {
        itemId: 'S01',
        because,
        checkBy: '2026-12-18',
        publishedOn: today,
        endedOn: null,
        reply: null,
        can: { end: true, reply: false },
      },
      { itemId: 'T05' },
    ])
  })

  it('stops with the consent, at the moment it is withdrawn', async () => {
    const consent = await share()
    expect((await seen()).can.publish).toBe(true)
    await giveConsent(child, 'share_school_seating', therapist, {
      ...consent,
      id: randomUUID(),
      kind: 'withdrawn',
      withdrawsId: consent.id,
    })
    expect((await seen()).can.publish).toBe(false)
    expect((await publish(advice('S01'))).status).toBe(409)
    expect(await database().manager.countBy(Consent, { childId: child.id })).toBe(2)
  })

  it('keeps to five items in force, however they are added', async () => {
    await share()
    expect((await publish(advice('S01', 'S02', 'S04', 'S05'))).status).toBe(201)
    const many = await publish(advice('W01', 'W02'))
    expect([many.status, many.body.fields.items]).toEqual([422, expect.stringContaining('4 are in force')])
    expect((await publish(advice('W01', 'W02', 'W03', 'W05', 'W10', 'W11'))).body.fields.items).toBe(
      'Choose five items at most',
    )
    const both = await Promise.all([publish(advice('W01')), publish(advice('W02'))])
    expect(both.map(({ status }) => status).toSorted()).toEqual([201, 422])
    expect(await rows()).toHaveLength(5)
  })

  it.each<[string, object, string]>([
    ['no item', advice(), 'items'],
    ['an item of the library for families only', advice('H03'), 'items[0].itemId'],
    ['an item the library does not have', advice('S99'), 'items[0].itemId'],
    ['an id that is none', advice('S01; DROP'), 'items[0].itemId'],
    ['one item twice', advice('S01', 'S01'), 'items[1].itemId'],
    ['no reason', { items: [{ itemId: 'S01', because: '' }], checkBy: '2026-12-18' }, 'items[0].because'],
    [
      'a reason that moves the pencil to the other hand',
      { items: [{ itemId: 'S01', because: 'Move the pencil to the right hand.' }], checkBy: '2026-12-18' },
      'items[0].because',
    ],
    ['a check date in the past', { ...advice('S01'), checkBy: '2026-11-19' }, 'checkBy'],
    ['a check date years ahead', { ...advice('S01'), checkBy: '2062-12-18' }, 'checkBy'],
    ['a day that is none', { ...advice('S01'), checkBy: '2027-02-30' }, 'checkBy'],
    ['a field that is not on the form', { ...advice('S01'), publishedById: randomUUID() }, 'form'],
  ])('refuses %s beside the field and keeps nothing', async (_what, body, field) => {
    await share()
    const response = await publish(body)
    expect([response.status, Object.keys(response.body.fields)]).toEqual([422, [field]])
    expect(await rows()).toEqual([])
  })

  it('takes the last allowed day: today, and a year ahead', async () => {
    await share()
    expect((await publish({ ...advice('S01'), checkBy: today })).status).toBe(201)
    expect((await publish({ ...advice('S02'), checkBy: addDays(today, 366) })).status).toBe(201)
  })

  it('gives an item once: again is refused while it is in force, and the same form sent twice adds nothing', async () => {
    await share()
    const key = randomUUID()
    const send = () => anna.post(at('/advice')).set('Idempotency-Key', key).send(advice('S01'))
    expect([(await send()).status, (await send()).status]).toEqual([201, 201])
    expect(await rows()).toHaveLength(1)
    expect((await publish(advice('S01'))).body.fields).toEqual({
      'items[0].itemId': 'The teacher has this item already',
    })
  })

  it('is undone by ending an item, once; what was given stays in the record', async () => {
    await share()
    const given = await publish(advice('S01'))
    const [{ id }] = given.body.published
    expect((await anna.post(at(`/advice/${id}/end`)).send()).status).toBe(204)
    const again = await anna.post(at(`/advice/${id}/end`)).send()
    expect([again.status, again.body.code]).toEqual([409, 'closed'])
    expect((await seen()).published).toMatchObject([{ id, endedOn: today, can: { end: false } }])
    expect((await publish(advice('S01'))).status).toBe(201)
    expect(await rows()).toHaveLength(2)
  })
})

describe('who may', () => {
  const everything = async (as: Client, adviceId: string) => [
    (await as.get(at('/school'))).status,
    (await publish(advice('S02'), as)).status,
    (await as.post(at(`/advice/${adviceId}/end`)).send()).status,
  ]

  it('is the assigned therapist; a lead reads; nobody else knows of it', async () => {
    await share()
    const given = await publish(advice('S01'))
    const [{ id }] = given.body.published
    const guardian = await buildUser('guardian')
    await buildGuardian(child, guardian)
    expect(await everything(await signedInAs(await buildUser('clinicLead')), id)).toEqual([200, 403, 403])
    for (const person of [
      await buildUser('therapist'),
      await buildUser('administrator'),
      guardian,
      teacher,
      await buildUser('teacher'),
    ])
      expect(await everything(await signedInAs(person), id)).toEqual([404, 404, 404])
    expect(await rows()).toMatchObject([{ itemId: 'S01', endedAt: null }])
  })

  it('never ends another child’s item through this child', async () => {
    await share()
    const given = await publish(advice('S01'))
    const [{ id }] = given.body.published
    const other = await buildChild({ therapist })
    for (const adviceId of [id, randomUUID(), 'x'])
      expect((await anna.post(at(`/advice/${adviceId}/end`, other)).send()).status).toBe(404)
    expect(await rows()).toMatchObject([{ endedAt: null }])
  })

  it('leaves an entry for each reading and each item, with ids and no text', async () => {
    await share()
    await seen()
    await publish(advice('S01'))
    const entries = await database().query(
      "SELECT action, relation, detail FROM audit_entries WHERE childId = ? AND action LIKE 'schoolAdvice%' ORDER BY position",
      [child.id],
    )
    expect(entries.map((entry: { action: string }) => entry.action)).toEqual([
      'schoolAdvice.read',
      'schoolAdvice.published',
    ])
    expect(JSON.stringify(entries)).not.toContain('elbows')
  })
})
