import { randomUUID } from 'node:crypto'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { enqueueMail } from '../../server/services/outbox.ts'
import { deliverDue } from '../../server/services/outboxWorker.ts'
import { signedInAs, startApp, stopApp, testAppUrl } from '../support/app.ts'
import { buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { letterScene, queuedLetter } from '../support/letters.ts'
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
beforeEach(() => mail.clear())
afterEach(async () => {
  setClock(() => new Date())
  await mail.failNext('refuse', 0)
})

const minutesLater = (minutes: number) => {
  const moment = new Date(Date.now() + minutes * 60_000)
  setClock(() => moment)
}
const enqueue = (recipient: string) =>
  database().transaction((tx) =>
    enqueueMail(
      tx,
      { kind: 'invitation', recipient, subject: 'Hello', text: 'Hello', html: '<p>Hello</p>' },
      null,
    ),
  )
const stateOf = async (id: string) => {
  const [row] = await database().query('SELECT state, attempts, problem FROM outbox_messages WHERE id = ?', [
    id,
  ])
  return row as { state: string; attempts: number; problem: string | null }
}
const address = () => `carer-${randomUUID().slice(0, 8)}@harrowmere.example`

describe('the outbox', () => {
  it('delivers a letter’s notice, which says nothing about the child, and then calls the letter sent', async () => {
    const scene = await letterScene()
    const letter = await queuedLetter(scene)
    await mail.deliver()
    const [message] = await mail.messages(scene.guardianUser.email)
    expect(message?.text).toContain(`/letter/${letter.deliveries[0]?.id}`)
    expect(JSON.stringify(message)).not.toContain('Wrenna')
    const after = await scene.as.get(`${scene.base}/${letter.id}`)
    expect(after.body).toMatchObject({ state: 'sent', deliveries: [{ state: 'sent' }] })
  })

  it('leaves nothing when the act is rolled back', async () => {
    const recipient = address()
    await expect(
      database().transaction(async (tx) => {
        await enqueueMail(
          tx,
          { kind: 'invitation', recipient, subject: 'Hello', text: 'Hello', html: '' },
          null,
        )
        throw new Error('the act failed')
      }),
    ).rejects.toThrow('the act failed')
    expect(await database().query('SELECT id FROM outbox_messages WHERE recipient = ?', [recipient])).toEqual(
      [],
    )
  })

  it.each(['refuse', 421, 450, 451, 'cutBeforeDot'] as const)(
    'tries again after %s and delivers once',
    async (fault) => {
      const recipient = address()
      const id = await enqueue(recipient)
      await mail.failNext(fault, 1)
      await mail.deliver()
      expect(await stateOf(id)).toMatchObject({ state: 'queued', attempts: 1 })
      await mail.deliver()
      expect((await stateOf(id)).attempts).toBe(1)
      minutesLater(2)
      await mail.deliver()
      expect(await stateOf(id)).toMatchObject({ state: 'sent', attempts: 2, problem: null })
      expect(await mail.messages(recipient)).toHaveLength(1)
    },
  )

  it('sends the same Message-ID again when the answer to the final dot was lost', async () => {
    const recipient = address()
    const id = await enqueue(recipient)
    await mail.failNext('cutAfterDot', 1)
    await mail.deliver()
    minutesLater(2)
    await mail.deliver()
    expect((await stateOf(id)).state).toBe('sent')
    const messages = await mail.messages(recipient)
    expect(messages.length).toBeGreaterThanOrEqual(1)
    expect(new Set(messages.map((message) => message.messageId)).size).toBe(1)
  })

  it('goes to a second carer after the first has it, and the letter stays sent', async () => {
    const scene = await letterScene()
    const letter = await queuedLetter(scene)
    await mail.deliver()
    const second = await buildGuardian(scene.child, await buildUser('guardian'))
    await giveConsent(scene.child, 'email_link', scene.therapist, { guardianId: second.id })
    const { body: sent } = await scene.as.get(`${scene.base}/${letter.id}`)
    const again = await scene.as
      .post(`${scene.base}/${letter.id}/send`)
      .set('If-Match', `"${sent.version}"`)
      .send({ guardianIds: [second.id] })
    expect([sent.state, again.status, again.body.state]).toEqual(['sent', 200, 'sent'])
    await mail.deliver()
    expect(await mail.messages(second.email ?? '')).toHaveLength(1)
    expect(await mail.messages(scene.guardianUser.email)).toHaveLength(1)
  })

  it('gives up at once on 550, says so on the letter, makes a task for the author, and lets the lead try again', async () => {
    const scene = await letterScene()
    const letter = await queuedLetter(scene)
    await mail.failNext(550, 1, scene.guardianUser.email)
    await mail.deliver()
    const after = await scene.as.get(`${scene.base}/${letter.id}`)
    expect(after.body.deliveries[0]).toMatchObject({
      state: 'failed',
      attempts: 1,
      problem: 'The address was refused (550): check it with the family',
      can: { retry: false },
    })
    const tasks = await database().query('SELECT kind, assigneeId FROM tasks WHERE childId = ?', [
      scene.child.id,
    ])
    expect(tasks).toEqual([{ kind: 'letter_failed', assigneeId: scene.therapist.id }])
    const retry = `${scene.base}/${letter.id}/deliveries/${letter.deliveries[0]?.id}/retry`
    expect((await scene.as.post(retry).send()).status).toBe(403)
    const retried = await (await signedInAs(await buildUser('clinicLead'))).post(retry).send()
    expect(retried.status).toBe(200)
    await mail.deliver()
    expect(await mail.messages(scene.guardianUser.email)).toHaveLength(1)
  })

  it('tells the author of a letter refused for good, without a name, and of nothing else', async () => {
    const scene = await letterScene()
    const letter = await queuedLetter(scene)
    await mail.failNext(550, 1, scene.guardianUser.email)
    await mail.deliver()
    const told = await mail.messages(scene.therapist.email)
    expect(told).toHaveLength(1)
    expect(told[0]?.text).toContain(`${testAppUrl}${scene.base.replace('/api', '')}/${letter.id}`)
    expect(told[0]?.text).toContain('refused')
    for (const word of ['Wrenna', scene.child.familyName, scene.guardianUser.email])
      expect(JSON.stringify(told)).not.toContain(word)
    await mail.deliver()
    expect(await mail.messages()).toHaveLength(1)
  })

  it('says five days when it gave up, and nothing more when that e-mail fails in its turn', async () => {
    const scene = await letterScene()
    await queuedLetter(scene)
    await mail.failNext('refuse', 1)
    minutesLater(5 * 24 * 60 + 1)
    await mail.failNext(550, 1, scene.therapist.email)
    await mail.deliver()
    await mail.deliver()
    const told = await database().query(
      "SELECT state, CONVERT(mime USING utf8mb4) AS mime FROM outbox_messages WHERE kind = 'delivery_failed' AND recipient = ?",
      [scene.therapist.email],
    )
    expect(told).toHaveLength(1)
    expect(told[0].state).toBe('failed')
    expect(told[0].mime).toContain('five days')
  })

  it('tells no author whose account was closed; the task is there all the same', async () => {
    const scene = await letterScene()
    await queuedLetter(scene)
    await database().query('UPDATE users SET disabledAt = NOW() WHERE id = ?', [scene.therapist.id])
    await mail.failNext(550, 1, scene.guardianUser.email)
    await mail.deliver()
    expect(await mail.messages(scene.therapist.email)).toEqual([])
    const tasks = await database().query('SELECT kind FROM tasks WHERE childId = ?', [scene.child.id])
    expect(tasks).toEqual([{ kind: 'letter_failed' }])
  })

  it('gives up after five days of trouble', async () => {
    const id = await enqueue(address())
    await mail.failNext('refuse', 1)
    minutesLater(5 * 24 * 60 + 1)
    await mail.deliver()
    expect((await stateOf(id)).state).toBe('failed')
  })

  it('is not held up by one bad message', async () => {
    const [bad, good] = [address(), address()]
    await enqueue(bad)
    const id = await enqueue(good)
    await mail.failNext(451, 1, bad)
    await mail.deliver()
    expect((await stateOf(id)).state).toBe('sent')
  })

  it('never lets two workers send one message', async () => {
    const recipients = Array.from({ length: 30 }, address)
    for (const recipient of recipients) await enqueue(recipient)
    await Promise.all([
      deliverDue(mail.transport, testAppUrl),
      deliverDue(mail.transport, testAppUrl),
      deliverDue(mail.transport, testAppUrl),
    ])
    for (const recipient of recipients) expect(await mail.messages(recipient)).toHaveLength(1)
  }, 30_000)

  it('takes over the message of a worker that died, when its lease has run out', async () => {
    const id = await enqueue(address())
    await database().query(
      "UPDATE outbox_messages SET state = 'sending', leaseOwner = 'gone', leaseUntil = ? WHERE id = ?",
      [new Date(Date.now() + 60_000), id],
    )
    await mail.deliver()
    expect((await stateOf(id)).state).toBe('sending')
    minutesLater(2)
    await mail.deliver()
    expect((await stateOf(id)).state).toBe('sent')
  })
})

describe('the bytes of an e-mail that brings a link', () => {
  const kept = async (id: string) => {
    const [row] = await database().query(
      'SELECT LENGTH(mime) AS bytes, LENGTH(mimeSha256) AS hash, state FROM outbox_messages WHERE id = ?',
      [id],
    )
    return { bytes: Number(row.bytes), hash: Number(row.hash), state: row.state as string }
  }
  const bytesOf = async (id: string): Promise<Buffer> =>
    (await database().query('SELECT mime FROM outbox_messages WHERE id = ?', [id]))[0].mime

  it('stay for the next try, the same ones, and are gone once it is sent; the hash stays', async () => {
    const id = await enqueue(address())
    const before = await bytesOf(id)
    await mail.failNext(451, 1)
    await mail.deliver()
    expect(await stateOf(id)).toMatchObject({ state: 'queued' })
    expect((await bytesOf(id)).equals(before)).toBe(true)
    minutesLater(2)
    await mail.deliver()
    expect(await kept(id)).toEqual({ bytes: 0, hash: 32, state: 'sent' })
  })

  it('are gone when it was refused for good', async () => {
    const id = await enqueue(address())
    await mail.failNext(550, 1)
    await mail.deliver()
    expect(await kept(id)).toEqual({ bytes: 0, hash: 32, state: 'failed' })
  })

  it('stay when it was a letter’s notice, which brings no secret', async () => {
    const scene = await letterScene()
    const letter = await queuedLetter(scene)
    await mail.deliver()
    const [row] = await database().query(
      `SELECT LENGTH(m.mime) AS bytes FROM outbox_messages m JOIN letter_deliveries d ON d.outboxMessageId = m.id
       WHERE d.id = ?`,
      [letter.deliveries[0]?.id],
    )
    expect(Number(row.bytes)).toBeGreaterThan(100)
  })

  it.each([
    ['emptying it while it waits', "mime = ''"],
    ['other bytes', "state = 'sent', mime = 'other'"],
    ['another hash', "state = 'sent', mime = '', mimeSha256 = REPEAT('a', 32)"],
    ['another kind', "kind = 'letter'"],
    ['another recipient', "state = 'sent', mime = '', recipient = 'other@harrowmere.example'"],
  ])('are kept by the database: %s is refused', async (_what, change) => {
    const id = await enqueue(address())
    await expect(database().query(`UPDATE outbox_messages SET ${change} WHERE id = ?`, [id])).rejects.toThrow(
      'a queued e-mail is never changed',
    )
    // Nothing of this test is left for the next delivery.
    await mail.deliver()
  })

  it('are not given back: an e-mail without bytes is never queued again', async () => {
    const id = await enqueue(address())
    await mail.deliver()
    for (const change of ["state = 'queued'", "mime = 'again'"])
      await expect(
        database().query(`UPDATE outbox_messages SET ${change} WHERE id = ?`, [id]),
      ).rejects.toThrow('a queued e-mail is never changed')
  })
})

describe('just before an e-mail leaves', () => {
  it.each([
    ['consent to e-mail was withdrawn', 'email_link'],
    ['consent to therapy was withdrawn', 'assessment_treatment'],
  ] as const)('it is cancelled when %s', async (_what, purpose) => {
    const scene = await letterScene()
    const letter = await queuedLetter(scene)
    const [given] = await database().query(
      "SELECT id FROM consents WHERE childId = ? AND purpose = ? AND kind = 'given'",
      [scene.child.id, purpose],
    )
    await giveConsent(scene.child, purpose, scene.therapist, {
      kind: 'withdrawn',
      withdrawsId: given.id,
      guardianId: purpose === 'email_link' ? scene.guardian.id : null,
    })
    await mail.deliver()
    expect(await mail.messages(scene.guardianUser.email)).toEqual([])
    const after = await scene.as.get(`${scene.base}/${letter.id}`)
    expect(after.body.deliveries[0].state).toBe('cancelled')
  })

  it.each([
    ['restricted', { restricted: 1 }],
    ['no longer safe to contact', { safeToContact: 0 }],
    ['at another address', { email: 'moved@harrowmere.example' }],
  ])('it is cancelled when the carer is %s', async (_what, change) => {
    const scene = await letterScene()
    await queuedLetter(scene)
    await database().query(`UPDATE guardians SET ${Object.keys(change)[0]} = ? WHERE id = ?`, [
      Object.values(change)[0],
      scene.guardian.id,
    ])
    await mail.deliver()
    expect(await mail.messages(scene.guardianUser.email)).toEqual([])
  })
})
