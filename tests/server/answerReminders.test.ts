import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { sendDueReminders } from '../../server/services/answerReminders.ts'
import { startApp, stopApp, testAppUrl } from '../support/app.ts'
import {
  aDayPasses,
  ask,
  askByLink,
  askingScene,
  askMother,
  askTeacher,
  byLink,
  linkToken,
  ownPage,
  requestsPath,
  saveAndSend,
  someAnswers,
  tasksOf,
  type AskingScene,
} from '../support/answers.ts'
import { giveConsent } from '../support/factories.ts'
import { mailsTo } from '../support/invitations.ts'
import { startMail, type Mail } from '../support/mail.ts'

let mail: Mail
beforeAll(async () => {
  await startApp()
  mail = await startMail()
})
afterAll(async () => {
  await mail.stop()
  await stopApp()
})
beforeEach(async () => {
  await mail.clear()
  // What earlier tests asked is over, so that each test counts its own.
  await database().query('UPDATE answer_requests SET cancelledAt = ? WHERE cancelledAt IS NULL', [new Date()])
})
afterEach(async () => {
  setClock(() => new Date())
  await mail.failNext('refuse', 0)
})

const begin = Date.now()
const day = (days: number, hours = 0) => {
  const moment = new Date(begin + days * 86_400_000 + hours * 3_600_000)
  setClock(() => moment)
}
const remind = () => sendDueReminders(testAppUrl)
const withdraw = async (scene: AskingScene, purpose: 'assessment_treatment' | 'share_school_observation') => {
  const [given] = await database().query(
    "SELECT id FROM consents WHERE childId = ? AND purpose = ? AND kind = 'given'",
    [scene.child.id, purpose],
  )
  await giveConsent(scene.child, purpose, scene.holder, { kind: 'withdrawn', withdrawsId: given.id })
}
const requestRow = async (id: string) => {
  const [row] = await database().query('SELECT reminders FROM answer_requests WHERE id = ?', [id])
  return row as { reminders: number }
}

describe('reminders', () => {
  it('go out on day 7 and day 14, once each, and then no more', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    const sent: number[] = []
    for (const days of [6.9, 7.1, 7.2, 13.9, 14.1, 20, 27]) {
      day(days)
      sent.push(await remind())
    }
    expect(sent).toEqual([0, 1, 0, 0, 1, 0, 0])
    expect((await requestRow(request.id)).reminders).toBe(2)
    const mails = await mailsTo(scene.carer.email)
    expect(mails.map(({ kind }) => kind)).toEqual(['answer_request', 'answer_request', 'answer_request'])
    expect(mails.at(-1)?.text).not.toContain(scene.child.familyName)
  })

  it('go out once when two workers look at the same moment', async () => {
    const scene = await askingScene()
    await askMother(scene)
    await askByLink(scene)
    await askTeacher(scene)
    day(7.5)
    const counts = await Promise.all([remind(), remind(), remind()])
    expect(counts.reduce((sum, count) => sum + count, 0)).toBe(3)
    for (const address of [scene.carer.email, scene.grandfather.email ?? '', scene.teacher.email])
      expect(await mailsTo(address)).toHaveLength(2)
  })

  it('bring one e-mail when the server was down on day 7 and comes back on day 15', async () => {
    const scene = await askingScene()
    await askMother(scene)
    day(15)
    expect([await remind(), await remind()]).toEqual([1, 0])
  })

  it('of a link bring a new link that opens what was begun', async () => {
    const scene = await askingScene()
    await askByLink(scene)
    const email = scene.grandfather.email ?? ''
    const first = await linkToken(email)
    await byLink.save(first, 0, { answers: someAnswers(), comment: 'Begun' })
    day(7.5)
    expect(await remind()).toBe(1)
    const second = await linkToken(email)
    expect(second).not.toBe(first)
    expect((await byLink.open(second)).body.comment).toBe('Begun')
    expect((await byLink.open(first)).status).toBe(410)
  })

  it('wait while somebody has saved within the last day', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    await database().query('UPDATE answer_requests SET savedAt = ? WHERE id = ?', [
      new Date(begin + 6.9 * 86_400_000),
      request.id,
    ])
    day(7.1)
    expect(await remind()).toBe(0)
    day(7.95)
    expect(await remind()).toBe(1)
  })

  it.each([
    [
      'the answers came',
      async (scene: AskingScene, id: string) => {
        const path = ownPage(scene.child, id)
        await saveAndSend(scene.asCarer, path, { answers: someAnswers(), comment: null })
      },
    ],
    [
      'the request was withdrawn',
      async (scene: AskingScene, id: string) => {
        const call = scene.therapist.post(requestsPath(scene.child, `/${id}/cancel`))
        expect((await call.set('If-Match', '"1"').send({})).status).toBe(204)
      },
    ],
    ['consent to assessment ended', (scene: AskingScene) => withdraw(scene, 'assessment_treatment')],
    [
      'the carer was restricted',
      (scene: AskingScene) =>
        database().query('UPDATE guardians SET restricted = 1 WHERE id = ?', [scene.mother.id]),
    ],
    [
      'it is no longer safe to write',
      (scene: AskingScene) =>
        database().query('UPDATE guardians SET safeToContact = 0 WHERE id = ?', [scene.mother.id]),
    ],
    [
      'the account was disabled',
      (scene: AskingScene) =>
        database().query('UPDATE users SET disabledAt = ? WHERE id = ?', [new Date(), scene.carer.id]),
    ],
  ])('do not go out when %s, neither made nor sent when queued before', async (_what, change) => {
    const scene = await askingScene()
    const request = await askMother(scene)
    await mail.deliver()
    await mail.clear()
    // Once queued and judged at sending …
    day(7.1)
    expect(await remind()).toBe(1)
    setClock(() => new Date())
    await change(scene, request.id)
    day(7.2)
    await mail.deliver()
    expect(await mail.messages(scene.carer.email)).toEqual([])
    expect((await mailsTo(scene.carer.email)).at(-1)?.state).toBe('cancelled')
    // … and none is made for day 14.
    day(14.1)
    expect(await remind()).toBe(0)
  })

  it('do not go to a teacher once the family takes back that school tells what it sees', async () => {
    const scene = await askingScene()
    await askTeacher(scene)
    await withdraw(scene, 'share_school_observation')
    day(7.1)
    expect(await remind()).toBe(0)
    await mail.deliver()
    expect(await mail.messages(scene.teacher.email)).toEqual([])
  })

  it('give the therapist a task when a teacher has not answered for 14 days, and only then', async () => {
    const scene = await askingScene()
    await askTeacher(scene)
    await askMother(scene)
    day(7.1)
    await remind()
    expect(await tasksOf(scene.child)).toEqual([])
    day(14.1)
    await remind()
    await remind()
    expect(await tasksOf(scene.child)).toEqual([{ kind: 'teacher_unanswered', assigneeId: scene.holder.id }])
  })

  it('by hand go out once a day, and not after the answers came', async () => {
    const scene = await askingScene()
    const request = await askMother(scene)
    const byHand = () => scene.therapist.post(requestsPath(scene.child, `/${request.id}/remind`)).send({})
    const tooSoon = await byHand()
    expect([tooSoon.status, tooSoon.body.code]).toEqual([409, 'reminded_lately'])
    await aDayPasses(request.id)
    expect((await byHand()).status).toBe(204)
    expect((await requestRow(request.id)).reminders).toBe(1)
    expect((await byHand()).status).toBe(409)
    expect((await requestRow(request.id)).reminders).toBe(1)
    expect(await mailsTo(scene.mother.email ?? '')).toHaveLength(2)
    expect((await byHand()).status).toBe(429)
    const path = ownPage(scene.child, request.id)
    await saveAndSend(scene.asCarer, path, { answers: someAnswers(), comment: null })
    await database().query('UPDATE throttles SET failures = 0')
    expect((await byHand()).body.code).toBe('closed')
  })

  it('by hand leave the first link and a carer who is at it alone', async () => {
    const scene = await askingScene()
    const request = await askByLink(scene)
    const token = await linkToken(scene.grandfather.email ?? '')
    await aDayPasses(request.id)
    await byLink.save(token, 0, { answers: someAnswers(), comment: null })
    const byHand = () => scene.therapist.post(requestsPath(scene.child, `/${request.id}/remind`)).send({})
    expect((await byHand()).body.code).toBe('reminded_lately')
    expect((await byLink.open(token)).status).toBe(200)
    await aDayPasses(request.id)
    expect((await byHand()).status).toBe(204)
  })

  it('by hand go out at once when the last e-mail could not be delivered', async () => {
    const scene = await askingScene()
    const request = await askByLink(scene)
    await mail.failNext(550, 1, scene.grandfather.email ?? '')
    await mail.deliver()
    const again = await scene.therapist.post(requestsPath(scene.child, `/${request.id}/remind`)).send({})
    expect(again.status).toBe(204)
    await mail.deliver()
    expect(await mail.messages(scene.grandfather.email ?? '')).toHaveLength(1)
  })

  it('leave a queued e-mail behind that a newer one replaced, so that only the working link arrives', async () => {
    const scene = await askingScene()
    const request = await askByLink(scene)
    await aDayPasses(request.id)
    await scene.therapist.post(requestsPath(scene.child, `/${request.id}/remind`)).send({})
    const token = await linkToken(scene.grandfather.email ?? '')
    await mail.deliver()
    const messages = await mail.messages(scene.grandfather.email ?? '')
    expect(messages).toHaveLength(1)
    expect(messages[0]?.text).toContain(token)
  })

  it('give the therapist a task when the address is refused', async () => {
    const scene = await askingScene()
    await ask(scene, { asks: 'history', guardianId: scene.grandfather.id, byLink: true })
    await mail.failNext(550, 1, scene.grandfather.email ?? '')
    await mail.deliver()
    expect(await tasksOf(scene.child)).toEqual([
      { kind: 'answer_request_failed', assigneeId: scene.holder.id },
    ])
  })
})
