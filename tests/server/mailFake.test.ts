import { createTransport } from 'nodemailer'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { startMailFake, type MailFake } from '../../fake-services/mail/server.ts'

type Listing = { total: number; messages: { id: string; to: string[]; subject: string; messageId: string }[] }

let fake: MailFake
beforeAll(async () => {
  fake = await startMailFake({ smtp: 0, inbox: 0 })
})
afterAll(() => fake.stop())
beforeEach(async () => {
  await fetch(`${fake.inboxUrl}/api/messages`, { method: 'DELETE' })
  await plan({ kind: 451, count: 0 })
})

const plan = (failure: unknown) =>
  fetch(`${fake.inboxUrl}/api/next-failure`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(failure),
  })
const inbox = async (query = '') =>
  (await (await fetch(`${fake.inboxUrl}/api/messages${query}`)).json()) as Listing
const read = async (path: string) => await fetch(`${fake.inboxUrl}${path}`)

const letter = {
  from: 'clinic@example.org',
  to: 'parent@example.org',
  subject: 'A letter about Zoë',
  messageId: '<letter-1@example.org>',
  text: 'Read it here: http://localhost:3000/letters/1?a=1&b=2. Thank you <all>.',
  html: '<p>Read <a href="http://localhost:3000/letters/1">it</a><script>document.title = "run"</script></p>',
  attachments: [{ filename: 'letter é.pdf', content: Buffer.from('%PDF-1.4 test') }],
}
/** Sends through a fresh connection, as the outbox does after a fault; resolves to null or the error. */
const send = (message: { to?: string | string[]; subject?: string } = {}) => {
  const transport = createTransport(fake.smtpUrl)
  return transport
    .sendMail({ ...letter, ...message })
    .then(
      () => null,
      (error: { code: string; responseCode?: number; command?: string }) => error,
    )
    .finally(() => transport.close())
}

describe('mail that arrives', () => {
  it('is listed newest first with its envelope and Message-ID, and found by recipient', async () => {
    expect(await send()).toBeNull()
    expect(await send({ to: ['Teacher@example.org', 'lead@example.org'], subject: 'Second' })).toBeNull()
    const all = await inbox()
    expect(all.total).toBe(2)
    expect(all.messages.map(({ subject }) => subject)).toEqual(['Second', 'A letter about Zoë'])
    expect(all.messages[1]).toMatchObject({ to: ['parent@example.org'], messageId: '<letter-1@example.org>' })
    expect((await inbox('?to=teacher@example.org')).messages).toHaveLength(1)
    expect((await inbox('?page=2')).messages).toEqual([])
  })

  it('is shown with text, links, formatted view and attachment, and runs no script of its own', async () => {
    await send()
    const id = (await inbox()).messages[0]?.id
    const json = (await (await read(`/api/messages/${id}`)).json()) as { text: string; html: string }
    expect(json.text).toContain('Thank you <all>.')
    expect(json.html).toContain('<script>')

    const page = await read(`/messages/${id}`)
    const html = await page.text()
    expect(html).toContain('<a href="http://localhost:3000/letters/1?a=1&amp;b=2">')
    expect(html).toContain('Thank you &lt;all&gt;.')
    expect(html).not.toContain('<script>')
    expect(page.headers.get('content-security-policy')).toContain("default-src 'none'")

    const formatted = await read(`/messages/${id}/html`)
    expect(formatted.headers.get('content-security-policy')).toMatch(/sandbox allow-popups/)
    const attachment = await read(`/messages/${id}/attachments/0`)
    expect(await attachment.text()).toBe('%PDF-1.4 test')
    expect(attachment.headers.get('content-disposition')).toContain('letter%20%C3%A9.pdf')
    expect((await read('/')).status).toBe(200)
  })

  it('answers 404 for a message that is not there and 421 to a foreign host name', async () => {
    expect((await read('/messages/none')).status).toBe(404)
    expect((await read('/api/messages/none')).status).toBe(404)
    const port = new URL(fake.inboxUrl).port
    const { request } = await import('node:http')
    const status = await new Promise((resolve, reject) =>
      request({ port, host: '127.0.0.1', path: '/', headers: { host: 'rebound.example.org' } }, (response) =>
        resolve(response.resume().statusCode),
      )
        .on('error', reject)
        .end(),
    )
    expect(status).toBe(421)
  })
})

describe('mail that fails as planned', () => {
  it.each([
    [450, 'RCPT TO'],
    [550, 'RCPT TO'],
    [421, 'DATA'],
    [451, 'DATA'],
  ])('is turned down with %i at %s the planned number of times, then flows', async (code, command) => {
    await plan({ kind: code, count: 2 })
    expect(await send()).toMatchObject({ responseCode: code, command })
    expect(await send()).toMatchObject({ responseCode: code })
    expect((await inbox()).total).toBe(0)
    expect(await send()).toBeNull()
    expect((await inbox()).total).toBe(1)
  })

  it('fails for the planned address only', async () => {
    await plan({ kind: 550, count: 5, address: 'Parent@example.org' })
    expect(await send({ to: 'teacher@example.org' })).toBeNull()
    expect(await send()).toMatchObject({ responseCode: 550 })
  })

  it('is dropped before the greeting when refused', async () => {
    await plan({ kind: 'refuse' })
    const error = await send()
    expect(error).not.toBeNull()
    expect(error?.responseCode).toBeUndefined()
    expect(await send()).toBeNull()
  })

  it('is lost when cut before the final dot', async () => {
    await plan({ kind: 'cutBeforeDot' })
    expect(await send()).toMatchObject({ code: 'ECONNECTION' })
    expect((await inbox()).total).toBe(0)
  })

  it('is kept when cut after the final dot, so that a retry arrives twice under one Message-ID', async () => {
    await plan({ kind: 'cutAfterDot' })
    expect(await send()).not.toBeNull()
    expect(await send()).toBeNull()
    expect((await inbox()).messages.map(({ messageId }) => messageId)).toEqual([
      '<letter-1@example.org>',
      '<letter-1@example.org>',
    ])
  })

  it('is answered late when slow, and kept', async () => {
    await plan({ kind: 'slow' })
    const before = performance.now()
    expect(await send()).toBeNull()
    expect(performance.now() - before).toBeGreaterThan(1_900)
    expect((await inbox()).total).toBe(1)
  })

  it.each([
    [{ kind: 499 }],
    [{ kind: 451, count: -1 }],
    [{ kind: 451, count: 'many' }],
    [{ kind: 550, address: 7 }],
    [{ kind: 'refuse', address: 'a@example.org' }],
    [[]],
    [null],
  ])('is not planned from %j: the answer is 422', async (body) => {
    expect((await plan(body)).status).toBe(422)
    expect(await send()).toBeNull()
  })
})
