import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { systemActor } from '../../server/access/actor.ts'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { History } from '../../server/entities/History.ts'
import type { User } from '../../server/entities/User.ts'
import { raiseReferralFlags } from '../../server/services/alerts.ts'
import { beginHistory, lockHistory, saveHistory } from '../../server/services/historyStore.ts'
import { transact } from '../../server/services/transact.ts'
import type { AlertView } from '../../shared/alerts.ts'
import { referralFlagsOf } from '../../shared/referralFlags.ts'
import type { HistoryDetails } from '../../shared/histories.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import {
  askByLink,
  askingScene,
  askMother,
  askTeacher,
  byLink,
  linkToken,
  ownPage,
  pupilPage,
  put,
  saveAndSend,
  someAnswers,
  type AskingScene,
} from '../support/answers.ts'
import { buildChild, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { buildHistory, historyDetails } from '../support/histories.ts'

let therapist: User
let anna: Client
let child: Child & { episodeId: string }

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
  child = await buildChild({ therapist, birthDate: '2018-05-04', state: 'formulated' })
  await giveConsent(child, 'assessment_treatment', therapist)
})

const record = (path = '') => `/api/children/${child.id}${path}`
const alerts = async (): Promise<AlertView[]> => (await anna.get(record('/alerts'))).body.rows
const flags = async () => (await alerts()).map(({ flag }) => flag).toSorted()
const act = (id: string, action = 'Spoke to the mother; the family doctor sees them today.') =>
  anna.post(record(`/alerts/${id}/action`)).send({ action })
const tasks = async () =>
  (await database().query(
    "SELECT text, dueOn, assigneeId, forRole FROM tasks WHERE childId = ? AND kind = 'red_flag' AND doneAt IS NULL",
    [child.id],
  )) as { text: string; dueOn: string; assigneeId: string | null; forRole: string | null }[]

const told = async (): Promise<{ save: (given: Partial<HistoryDetails>) => Promise<void> }> => {
  const { id } = await buildHistory(child, therapist, { locked: false })
  let version = 1
  return {
    save: async (given) => {
      const saved = await anna
        .put(record(`/histories/${id}`))
        .set('If-Match', `"${version}"`)
        .send({ respondentName: 'Mother', answeredOn: '2026-06-09', details: historyDetails(given) })
      expect(saved.status, saved.text).toBe(200)
      version = saved.body.version
    },
  }
}

describe('a red flag of a history', () => {
  it('stands on the record the moment its answer is saved, with urgency, advice, hold and a task', async () => {
    const { save } = await told()
    await save({ faceDroop: 'yes' })
    const [alert] = await alerts()
    expect(alert).toMatchObject({
      flag: 'new-neurological-signs',
      urgency: 'same_day',
      level: 'overdue',
      holdsBooking: true,
      origin: 'history',
      raisedBy: 'Adaeze Nwosu-Reid',
      raisedAt: '2026-06-10T09:00:00.000Z',
      actedAt: null,
      can: { act: true },
    })
    expect(alert?.text).toContain('a drooping face')
    expect(alert?.advice).toContain('local emergency guidance')
    expect(await tasks()).toEqual([
      {
        text: expect.stringContaining('the same day'),
        dueOn: '2026-06-10',
        assigneeId: therapist.id,
        forRole: null,
      },
    ])
    const head = (await anna.get(record())).body
    expect(head.alerts[0]).toMatchObject({ urgency: 'same_day', advice: alert?.advice })
    expect(head.emergencyText).toContain('emergency number')
  })

  it('stands once, however often the answers are saved, and is not taken back with the answer', async () => {
    const { save } = await told()
    await save({ pain: 7 })
    await save({ pain: 7, enjoys: 'Dens' })
    await save({ pain: 1, enjoys: 'Dens' })
    const found = await alerts()
    expect(found.map(({ flag, text, actedAt }) => [flag, text, actedAt])).toEqual([
      ['pain', 'Writing hurts (7 out of 10).', null],
    ])
    expect(await tasks()).toHaveLength(1)
  })

  it('takes up a further sign while it is open', async () => {
    const { save } = await told()
    await save({ numbness: 'yes' })
    await save({ numbness: 'yes', seizure: 'yes' })
    const [alert, ...more] = await alerts()
    expect(more).toEqual([])
    expect(alert?.text).toMatch(/numbness.*Reported since.*a seizure/)
  })

  it('does not come back once acted on, until something new is reported', async () => {
    const { save } = await told()
    await save({ numbness: 'yes' })
    const [first] = await alerts()
    expect((await act(first!.id)).status).toBe(204)
    await save({ numbness: 'yes', enjoys: 'Dens' })
    expect(await alerts()).toHaveLength(1)
    expect(await tasks()).toEqual([])

    await save({ numbness: 'yes', seizure: 'yes' })
    const [second, acted] = (await alerts()).toSorted((a) => (a.actedAt === null ? -1 : 1))
    expect(second).toMatchObject({ flag: 'new-neurological-signs', actedAt: null })
    expect(acted).toMatchObject({
      actedBy: 'Adaeze Nwosu-Reid',
      actedAt: '2026-06-10T09:00:00.000Z',
      action: 'Spoke to the mother; the family doctor sees them today.',
      can: { act: false },
    })
    expect(await tasks()).toHaveLength(1)
  })

  it('comes from a carer at home without an account too, with nobody named as raising it', async () => {
    const carer = await buildGuardian(child, null, { name: 'Maren Holt' })
    await transact(systemActor('test'), async (tx, note) => {
      const id = await beginHistory(tx, note, {
        childId: child.id,
        informant: 'guardian',
        respondentName: 'Maren Holt',
        answeredOn: '2026-06-10',
        requestId: null,
        guardianId: carer.id,
        startedById: null,
        replacesId: null,
      })
      const history = await tx.findOneByOrFail(History, { id })
      await saveHistory(tx, note, {
        history,
        version: 1,
        details: historyDetails({ firstNoticedMonths: 8, gestationWeeks: 40, otherHandFisted: 'yes' }),
        byId: null,
      })
    })
    expect(await flags()).toEqual(['other-hand-or-lost-skill', 'preference-before-12-months'])
    expect((await alerts()).map(({ raisedBy }) => raisedBy)).toEqual([null, null])
    const trail = (await database().query(
      "SELECT action, relation, actorId FROM audit_entries WHERE childId = ? AND action IN ('alert.raised', 'history.changed')",
      [child.id],
    )) as object[]
    expect(trail).toHaveLength(3)
    for (const entry of trail) expect(entry).toMatchObject({ relation: 'guardian', actorId: null })
  })

  it('is raised once by two answers saved at the same time', async () => {
    const both = [await told(), await told()]
    await Promise.all(both.map(({ save }) => save({ dropsThings: 'yes' })))
    expect(await flags()).toEqual(['other-hand-or-lost-skill'])
    expect(await tasks()).toHaveLength(1)
  })

  it('has a task of its own when it is for the same day, though an ordinary one is due today already', async () => {
    const { save } = await told()
    await save({ lostSkill: 'yes' })
    await save({ lostSkill: 'yes', faceDroop: 'yes' })
    expect(
      (await tasks()).map(({ text, dueOn }) => [dueOn, text.includes('the same day')]).toSorted(),
    ).toEqual([
      ['2026-06-10', false],
      ['2026-06-10', true],
    ])
    await save({ lostSkill: 'yes', faceDroop: 'yes', walkChanged: 'yes' })
    expect(await tasks()).toHaveLength(2)
  })

  it('goes to the lead while nobody holds the child', async () => {
    const lead = await buildUser('clinicLead')
    child = await buildChild({ birthDate: '2018-05-04' })
    const carer = await buildGuardian(child, null)
    await transact(systemActor('test'), async (tx, note) => {
      const { id } = await buildHistory(child, lead, {
        locked: false,
        informant: 'guardian',
        guardianId: carer.id,
      })
      const history = await tx.findOneByOrFail(History, { id })
      const details = historyDetails({ punishedForHand: 'yes' })
      await saveHistory(tx, note, { history, version: 1, details, byId: null })
    })
    const [task] = await tasks()
    expect([task?.assigneeId, task?.forRole]).toEqual([null, 'clinicLead'])
    // Wednesday 10 June and five working days.
    expect(task?.dueOn).toBe('2026-06-17')
  })
})

const nothing = {
  paperOffsetCm: null,
  paperTiltDegrees: null,
  otherHandSteadies: null,
  wristPosture: null,
  grip: null,
  fingerToTipMm: null,
  pressure: null,
  deskType: null,
  elbowClash: null,
  leftClearanceCm: null,
  lightSide: null,
  feetFlat: null,
  deskAboveElbowCm: null,
  note: null,
}

describe('a sign that a referral told first', () => {
  const referred = (...reasons: string[]) =>
    transact(systemActor('test'), async (tx, note) => {
      const to = { childId: child.id, therapistId: therapist.id, today: '2026-06-10' }
      const facts = { concerns: ['handwriting'], birthDate: '2018-05-04', receivedOn: '2026-06-10' } as const
      for (const reason of reasons)
        await raiseReferralFlags(tx, note, to, referralFlagsOf({ reason, ...facts }))
    })

  it('stands once when a history tells it too, and has a task for today when it is for the same day', async () => {
    await referred('Sudden weakness of the left hand.')
    const { save } = await told()
    await save({ numbness: 'yes' })
    const [alert, ...more] = await alerts()
    expect(more).toEqual([])
    expect(alert).toMatchObject({ flag: 'new-neurological-signs', origin: 'referral', urgency: 'same_day' })
    expect(alert?.text).toMatch(/“Sudden weakness”.*Reported since: .*numbness/)
    expect((await tasks()).some(({ text }) => text.startsWith('Today:'))).toBe(true)
  })

  it('stands once when a later referral tells it again, and comes back once it was acted on', async () => {
    await referred('He broke his left arm in May.', 'He broke his left arm in May.')
    expect(await flags()).toEqual(['change-of-hand'])
    await referred('Fractured the left wrist.')
    const [alert, ...more] = await alerts()
    expect(more).toEqual([])
    expect(alert?.text).toMatch(/broke his left arm.*Reported since.*Fractured/)
    // A referral's change of hand is looked at in five working days; told again, the table's row asks for today.
    expect((await tasks()).map(({ dueOn }) => dueOn).toSorted()).toEqual(['2026-06-10', '2026-06-17'])
    await act(alert!.id)
    await referred('Fractured the left wrist.')
    expect(await flags()).toEqual(['change-of-hand', 'change-of-hand'])
  })
})

describe('a red flag of a writing observation', () => {
  const observe = (given: object) =>
    anna.post(record('/writing-observations')).send({
      ...nothing,
      observedOn: '2026-06-09',
      writingHand: null,
      painBefore: null,
      painAfter: null,
      ...given,
    })

  it.each([
    [{ painAfter: 3 }, []],
    [{ painAfter: 4 }, ['pain']],
    [{ writingHand: 'right' }, ['change-of-hand']],
    [{ writingHand: 'left', pressure: 'medium' }, []],
    [{ writingHand: 'swaps' }, ['swaps-within-task']],
  ])('%j: %j', async (given, expected) => {
    expect((await observe(given)).status).toBe(201)
    expect(await flags()).toEqual(expected)
  })

  it('comes back with a later observation once the first was acted on', async () => {
    await observe({ painAfter: 5 })
    await act((await alerts())[0]!.id)
    await observe({ painAfter: 6 })
    expect((await alerts()).map(({ origin, actedAt }) => [origin, actedAt === null])).toContainEqual([
      'observation',
      true,
    ])
    expect(await alerts()).toHaveLength(2)
  })
})

describe('worse pain', () => {
  const pains = async () =>
    (await alerts()).filter(({ flag }) => flag === 'pain').map(({ text }) => text.match(/\d+ out of 10/g))
  const seen = (painAfter: number, observedOn: string) =>
    anna
      .post(record('/writing-observations'))
      .send({ ...nothing, observedOn, writingHand: null, painBefore: null, painAfter })

  it('told at home is added to the sign that stands; less pain is not', async () => {
    const { save } = await told()
    await save({ pain: 4 })
    await save({ pain: 9 })
    expect(await pains()).toEqual([['4 out of 10', '9 out of 10']])
    await save({ pain: 5 })
    expect(await pains()).toEqual([['4 out of 10', '9 out of 10']])
  })

  it('seen at the desk is added to the sign that stands, told or seen; less pain and the same pain are not', async () => {
    const { save } = await told()
    await save({ pain: 4 })
    await seen(6, '2026-06-01')
    await seen(6, '2026-06-02')
    await seen(9, '2026-06-03')
    await seen(5, '2026-06-04')
    expect(await pains()).toEqual([['4 out of 10', '6 out of 10', '9 out of 10']])
  })

  it('told after the first was acted on comes back; less pain does not', async () => {
    const { save } = await told()
    await save({ pain: 6 })
    await act((await alerts())[0]!.id)
    await save({ pain: 5 })
    expect(await alerts()).toHaveLength(1)
    await save({ pain: 8 })
    expect(await pains()).toHaveLength(2)
  })
})

describe('signs in the words of a family', () => {
  const answering = async () => {
    const carer = await buildGuardian(child)
    const { id } = await buildHistory(child, therapist, {
      locked: false,
      informant: 'guardian',
      guardianId: carer.id,
      startedById: null,
    })
    const stored = () => database().manager.findOneByOrFail(History, { id })
    const save = (given: Partial<HistoryDetails>) =>
      transact(systemActor('request'), async (tx, log) => {
        const history = await stored()
        const details = historyDetails({ enjoys: 'Dens', ...given })
        await saveHistory(tx, log, { history, version: history.version, details, byId: null })
      })
    const send = () =>
      transact(systemActor('request'), async (tx, log) => {
        const history = await stored()
        await lockHistory(tx, log, { history, version: history.version, lockedById: null })
      })
    return { id, save, send }
  }
  const texts = async () => (await alerts()).map(({ text }) => text)

  it('are raised when a save ends their word, quoted, with the urgency of their row and a task', async () => {
    const { id, save } = await answering()
    await save({ anythingElse: 'He likes numb' })
    await save({ anythingElse: 'He likes numbers. In May he had a seizure' })
    expect(await alerts()).toEqual([])
    await save({ anythingElse: 'He likes numbers. In May he had a seizure, and' })
    const [alert, ...more] = await alerts()
    expect(more).toEqual([])
    expect(alert).toMatchObject({
      flag: 'new-neurological-signs',
      text: 'The family wrote: “seizure”.',
      urgency: 'same_day',
      origin: 'history',
      originId: id,
      holdsBooking: true,
    })
    expect(await tasks()).toHaveLength(1)
  })

  it('count for the last word too once the text rests, and once it is sent', async () => {
    const resting = await answering()
    await resting.save({ anythingElse: 'He had a seizure' })
    expect(await alerts()).toEqual([])
    await resting.save({ anythingElse: 'He had a seizure', pain: 1 })
    expect(await texts()).toEqual(['The family wrote: “seizure”.'])

    const sent = await answering()
    await sent.save({ childsWords: 'My arm is numb' })
    expect(await texts()).toHaveLength(1)
    await sent.send()
    expect(await texts()).toEqual(['The family wrote: “seizure”. Reported since: The family wrote: “numb”.'])
  })

  it('stand once, are added to what was answered, and come back only with new words', async () => {
    const { save, send } = await answering()
    await save({ numbness: 'yes', anythingElse: 'Since the seizure he is tired.' })
    expect(await texts()).toEqual([
      expect.stringMatching(/^There is numbness\..*Reported since: The family wrote: “seizure”\.$/),
    ])
    await save({ numbness: 'yes', anythingElse: 'Since the seizure he is very tired.' })
    expect(await alerts()).toHaveLength(1)
    await act((await alerts())[0]!.id)
    await save({ numbness: 'yes', anythingElse: 'Since the seizure he is very tired. Sleeps well.' })
    await send()
    expect(await alerts()).toHaveLength(1)
  })

  it('are not seen in what is denied', async () => {
    const { save, send } = await answering()
    await save({ anythingElse: 'No seizures, headaches or numbness.' })
    await send()
    expect(await alerts()).toEqual([])
  })

  it('are looked for in what a family wrote, and not in what a therapist wrote down', async () => {
    const { save } = await told()
    await save({ anythingElse: 'The seizure of 2024 was looked at in hospital.' })
    expect(await alerts()).toEqual([])
  })
})

describe('signs in the comment of a questionnaire', () => {
  const alertsOf = async (scene: AskingScene): Promise<AlertView[]> =>
    (await scene.therapist.get(`/api/children/${scene.child.id}/alerts`)).body.rows

  it('are raised as a teacher or a family writes them, under the response, by who signed in', async () => {
    const scene = await askingScene()
    const school = await askTeacher(scene)
    const at = pupilPage(scene.child, school.id)
    const saved = await put(scene.asTeacher, at, 0, {
      answers: someAnswers(),
      comment: 'No pain. She drops things at lun',
    })
    expect(saved.status, saved.text).toBe(200)
    const [alert] = await alertsOf(scene)
    expect(alert).toMatchObject({
      flag: 'other-hand-or-lost-skill',
      text: 'The teacher wrote: “drops things”.',
      origin: 'questionnaire',
      raisedBy: scene.teacher.displayName,
    })
    const home = await askMother(scene)
    await saveAndSend(scene.asCarer, ownPage(scene.child, home.id), {
      answers: someAnswers(),
      comment: 'Her face droops',
    })
    expect((await alertsOf(scene)).map(({ text }) => text).toSorted()).toEqual([
      'The family wrote: “face droops”.',
      'The teacher wrote: “drops things”.',
    ])
  })

  it('are raised through a link with nobody named', async () => {
    const scene = await askingScene()
    await askByLink(scene)
    const token = await linkToken(scene.grandfather.email!)
    const saved = await byLink.save(token, 0, {
      answers: someAnswers(),
      comment: 'His hand hurts. He is brave.',
    })
    expect(saved.status, saved.text).toBe(200)
    const [alert, ...more] = await alertsOf(scene)
    expect(more).toEqual([])
    expect(alert).toMatchObject({ flag: 'pain', urgency: 'safeguarding', raisedBy: null })
  })
})

describe('a sign raised by hand', () => {
  const raise = (body: object, who = anna) => who.post(record('/alerts')).send(body)

  it('takes its urgency, advice and hold from its row of the table', async () => {
    const raised = await raise({ flag: 'other-hand-or-lost-skill', words: 'Keeps the right hand in a fist' })
    expect(raised.status).toBe(201)
    expect(raised.body).toMatchObject({
      text: 'Keeps the right hand in a fist',
      urgency: 'medical_review',
      advice: 'Ask for a medical review; do not book a routine block first.',
      holdsBooking: true,
      origin: 'therapist',
      originId: null,
      raisedBy: 'Adaeze Nwosu-Reid',
    })
    expect(await tasks()).toHaveLength(1)
  })

  it.each([
    ['a row nobody has', { flag: 'bad-mood', words: 'Looks tired' }, 'flag'],
    ['no words', { flag: 'pain', words: '' }, 'words'],
    ['an urgency of its own', { flag: 'pain', words: 'It hurts a lot', urgency: 'ask' }, 'form'],
  ])('names the field when it has %s', async (_what, body, field) => {
    const refused = await raise(body)
    expect([refused.status, Object.keys(refused.body.fields)]).toEqual([422, [field]])
    expect(await alerts()).toEqual([])
  })

  it('is the lead’s to raise too, and nobody else’s', async () => {
    const mother = await buildUser('guardian')
    await buildGuardian(child, mother)
    const body = { flag: 'pain', words: 'It hurts after a page' }
    const of = async (user: User) => (await raise(body, await signedInAs(user))).status
    expect(await of(await buildUser('clinicLead'))).toBe(201)
    expect(await of(await buildUser('administrator'))).toBe(403)
    expect(await of(mother)).toBe(403)
    expect(await of(await buildUser('therapist'))).toBe(404)
    expect((await (await signedInAs(mother)).get(record('/alerts'))).status).toBe(403)
  })
})

describe('a routine block', () => {
  const toTherapy = async () => {
    const glance = (await anna.get(record('/glance'))).body
    return anna
      .post(record('/state'))
      .set('If-Match', `"${glance.episodeVersion}"`)
      .send({ to: 'active', reason: 'A block of six sessions' })
  }

  it('is held back by a flag that says so until a named person has acted', async () => {
    const { save } = await told()
    await save({ lostSkill: 'yes' })
    const refused = await toTherapy()
    expect([refused.status, refused.body.code]).toEqual([409, 'booking_held'])
    expect(refused.body.message).toMatch(/a skill has been lost/)
    expect(refused.body.message).toMatch(/therapist or the clinic lead/)
    expect((await anna.get(record())).body.state).toBe('formulated')

    await act((await alerts())[0]!.id)
    expect((await toTherapy()).status).toBe(204)
    expect((await anna.get(record())).body.state).toBe('active')
  })

  it('goes ahead beside a flag that asks for something else', async () => {
    const { save } = await told()
    await save({ pain: 6, tremor: 'yes' })
    expect((await toTherapy()).status).toBe(204)
  })

  it('may end, and the child may be reviewed, whatever stands on the record', async () => {
    await anna.post(record('/alerts')).send({ flag: 'walk-changed', words: 'Limps since Monday' })
    const glance = (await anna.get(record('/glance'))).body
    const reviewed = await anna
      .post(record('/state'))
      .set('If-Match', `"${glance.episodeVersion}"`)
      .send({ to: 'review', reason: 'Look again in autumn' })
    expect(reviewed.status).toBe(204)
  })
})
