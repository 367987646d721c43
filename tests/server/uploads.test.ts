import { randomUUID } from 'node:crypto'
import { request as httpRequest, type IncomingMessage } from 'node:http'
import type { AddressInfo } from 'node:net'
import { json } from 'node:stream/consumers'
import { deflateSync } from 'node:zlib'
import type { Express } from 'express'
import sharp from 'sharp'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { setClock } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Sample } from '../../server/entities/Sample.ts'
import type { User } from '../../server/entities/User.ts'
import { signedInAs, stopApp, testAppUrl, useApp, type Client } from '../support/app.ts'
import { openClinicDatabase } from '../support/clinicDatabase.ts'
import { buildChild, buildUser, giveConsent } from '../support/factories.ts'
import { pdfOf } from '../support/pdfs.ts'
import { bomb, moving, paddedTo, picture } from '../support/pictures.ts'
import { sampleDetails, upload, type Upload } from '../support/uploads.ts'

const imageCap = 8 * 1024 * 1024
const pdfCap = 10 * 1024 * 1024

let app: Express
let therapist: User
let anna: Client
let child: Child

beforeAll(async () => {
  await openClinicDatabase()
  app = createApp({
    appUrl: testAppUrl,
    sessionSecret: 'only-for-tests-only-for-tests-only',
    demo: false,
    inboxUrl: null,
    demoSignIns: [],
    clientDir: null,
  })
  useApp(app)
  setClock(() => new Date('2026-06-10T09:00:00Z'))
  therapist = await buildUser('therapist')
  anna = await signedInAs(therapist)
  child = await buildChild({ therapist })
  await giveConsent(child, 'store_work_samples', therapist)
})
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

const send = (given: Upload, of: Pick<Child, 'id'> = child) => upload(anna, of.id, given)
const stored = async () => Number((await database().query('SELECT COUNT(*) AS n FROM samples'))[0].n)

/** A row as if sent an hour before, with a size of our choice and hardly any bytes. */
const storedRow = (of: Pick<Child, 'id'>, by: User, bytes: number) => ({
  id: randomUUID(),
  childId: of.id,
  takenOn: '2026-06-01',
  details: sampleDetails(),
  contentType: 'image/jpeg' as const,
  bytes,
  width: 1,
  height: 1,
  pixelsPerMm: null,
  sha256: Buffer.alloc(32),
  originalSha256: Buffer.alloc(32),
  content: Buffer.alloc(1),
  thumbnail: null,
  uploadedById: by.id,
  uploadedAt: new Date('2026-06-10T08:00:00Z'),
  removedAt: null,
  removedById: null,
})

const executable = Buffer.concat([Buffer.from('MZ\x90\x00\x03\x00\x00\x00'), Buffer.alloc(500)])
const svg = Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>')
const html = Buffer.from('<!doctype html><script>alert(1)</script>')
const zip = Buffer.concat([Buffer.from('PK\x03\x04\x14\x00', 'latin1'), Buffer.alloc(60)])
const gif = Buffer.from('R0lGODlhAQABAAAAACH5BAEKAAEALAAAAAABAAEAAAICTAEAOw==', 'base64')
const heic = Buffer.concat([
  Buffer.from([0, 0, 0, 24]),
  Buffer.from('ftypheic\0\0\0\0heicmif1'),
  Buffer.alloc(40),
])
const tiff = Buffer.concat([Buffer.from('II*\0', 'latin1'), Buffer.alloc(60)])

/** A PNG that says it is animated: an acTL chunk before the picture. */
const animatedPng = (png: Buffer): Buffer => {
  const chunk = Buffer.from(
    '00000008' + Buffer.from('acTL').toString('hex') + '0000000200000000' + 'f38d9370',
    'hex',
  )
  return Buffer.concat([png.subarray(0, 33), chunk, png.subarray(33)])
}

describe('a file of another kind than its name says', () => {
  it.each([
    ['a program named .exe', executable, 'setup.exe', 'application/x-msdownload'],
    ['a program renamed to .jpg', executable, 'photo.jpg', 'image/jpeg'],
    ['a program renamed to .pdf', executable, 'scan.pdf', 'application/pdf'],
    ['a program behind two endings', executable, 'photo.jpg.exe', 'image/jpeg'],
    ['an SVG', svg, 'drawing.svg', 'image/svg+xml'],
    ['an SVG renamed to .png', svg, 'drawing.png', 'image/png'],
    ['a web page', html, 'page.html', 'text/html'],
    ['a web page renamed to .webp', html, 'page.webp', 'image/webp'],
    ['a ZIP', zip, 'work.zip', 'application/zip'],
    ['a ZIP renamed to .pdf', zip, 'work.pdf', 'application/pdf'],
    ['a GIF', gif, 'page.gif', 'image/gif'],
    ['a GIF renamed to .jpeg', gif, 'page.jpeg', 'image/jpeg'],
    ['a HEIC', heic, 'IMG_0001.HEIC', 'image/heic'],
    ['a HEIC renamed to .jpg', heic, 'IMG_0001.jpg', 'image/jpeg'],
    ['a TIFF', tiff, 'scan.tif', 'image/tiff'],
    ['plain text', Buffer.from('hello'), 'note.txt', 'text/plain'],
    ['no ending at all', Buffer.from('hello'), 'README', 'image/jpeg'],
    ['a PDF after a ZIP', Buffer.concat([zip, pdfOf()]), 'scan.pdf', 'application/pdf'],
  ])('is refused: %s', async (_what, bytes, name, type) => {
    const before = await stored()
    const response = await send({ bytes, name, type })
    expect([response.status, response.body.code]).toEqual([415, 'wrong_type'])
    expect(response.body.fields.file).toBe(response.body.message)
    expect(await stored()).toBe(before)
  })

  it('is refused when ending, declared type and content are three honest kinds that disagree', async () => {
    const png = await picture('png')
    const disagreeing: Upload[] = [
      { bytes: png, name: 'page.jpg', type: 'image/jpeg' },
      { bytes: png, name: 'page.png', type: 'image/jpeg' },
      { bytes: png, name: 'page.jpg', type: 'image/png' },
      { bytes: png, name: 'page.png', type: 'application/octet-stream' },
      { bytes: animatedPng(png), name: 'page.png', type: 'image/png' },
    ]
    for (const given of disagreeing) expect((await send(given)).status).toBe(415)
  })

  it('is told how to send a telephone’s own format', async () => {
    const response = await send({ bytes: heic, name: 'IMG_0001.heic', type: 'image/heic' })
    expect(response.body.message).toMatch(/most compatible|JPEG/)
  })
})

describe('a picture that cannot be opened in full', () => {
  const cut = async (format: 'jpeg' | 'png' | 'webp') => {
    const noise = sharp({
      create: {
        width: 400,
        height: 400,
        channels: 3,
        background: '#fff',
        noise: { type: 'gaussian', mean: 128, sigma: 40 },
      },
    })
    const whole = await noise.toFormat(format).toBuffer()
    return whole.subarray(0, Math.floor(whole.length * 0.6))
  }

  it.each([
    ['a JPEG cut short', () => cut('jpeg'), 'page.jpg', 'image/jpeg'],
    ['a PNG cut short', () => cut('png'), 'page.png', 'image/png'],
    ['a WebP cut short', () => cut('webp'), 'page.webp', 'image/webp'],
    [
      'a JPEG that is only a beginning',
      () => Buffer.from('ffd8ffe000104a46494600010100000100010000', 'hex'),
      'page.jpg',
      'image/jpeg',
    ],
    ['an empty file', () => Buffer.alloc(0), 'page.jpg', 'image/jpeg'],
    ['a picture that moves', moving, 'page.webp', 'image/webp'],
    [
      'a PDF with a program',
      () => pdfOf({ objects: { 6: '<</S /JavaScript /JS (x)>>' } }),
      'scan.pdf',
      'application/pdf',
    ],
    ['a PDF cut short', () => pdfOf().subarray(0, 400), 'scan.pdf', 'application/pdf'],
  ])('is refused beside the field: %s', async (_what, make, name, type) => {
    const before = await stored()
    const response = await send({ bytes: await make(), name, type })
    expect([response.status, response.body.code], response.text).toEqual([422, 'invalid'])
    expect(response.body.fields.file).toBeTruthy()
    expect(await stored()).toBe(before)
  })

  it.each([
    ['31 KB for 16 000 × 16 000 points', 16_000, 32_000],
    ['109 KB for 30 000 × 30 000 points', 30_000, 115_000],
  ])('is refused before it is opened: %s', async (_what, edge, atMost) => {
    const bytes = bomb(edge)
    expect(bytes.length).toBeLessThan(atMost)
    // The best of three: other work on the machine is not what is measured.
    const times: number[] = []
    for (let time = 0; time < 3; time += 1) {
      const start = performance.now()
      const response = await send({ bytes, name: 'page.png', type: 'image/png' })
      times.push(performance.now() - start)
      expect(response.status).toBe(422)
      expect(response.body.fields.file).toMatch(/40 million/)
    }
    expect(Math.min(...times)).toBeLessThan(200)
  })
})

describe('the size of a file', () => {
  it.each([
    ['a picture one byte below the limit', imageCap - 1, 201],
    ['a picture at the limit', imageCap, 201],
    ['a picture one byte above the limit', imageCap + 1, 413],
    ['a picture of 11 MB', 11 * 1024 * 1024, 413],
  ])('%s', async (_what, bytes, status) => {
    const response = await send({ bytes: await paddedTo(bytes) })
    expect(response.status, response.text).toBe(status)
    if (status === 413)
      expect(response.body).toMatchObject({ code: 'too_large', message: expect.stringContaining('8 MB') })
  })

  it.each([
    ['a PDF at the limit', pdfCap, 201],
    ['a PDF one byte above the limit', pdfCap + 1, 413],
  ])('%s', async (_what, bytes, status) => {
    const small = pdfOf()
    const padded = Buffer.concat([small, Buffer.alloc(bytes - small.length, '\n')])
    const response = await send({ bytes: padded, name: 'scan.pdf', type: 'application/pdf' })
    expect(response.status, response.text).toBe(status)
  })

  it('is refused as soon as too much is announced, before the file is sent', async () => {
    const server = app.listen(0, '127.0.0.1')
    await new Promise((resolve) => server.once('listening', resolve))
    const sending = httpRequest({
      port: (server.address() as AddressInfo).port,
      host: '127.0.0.1',
      method: 'POST',
      path: `/api/children/${child.id}/samples`,
      headers: {
        'Content-Type': 'multipart/form-data; boundary=cut',
        'Content-Length': 50 * 1024 * 1024,
        'X-Fanflower-User': anna.userId,
        'Sec-Fetch-Site': 'same-origin',
        Cookie: anna.cookie.join('; '),
      },
    })
    sending.on('error', () => undefined)
    sending.write('--cut\r\n')
    const answer = await new Promise<IncomingMessage>((resolve) => sending.once('response', resolve))
    expect([answer.statusCode, await json(answer)]).toEqual([
      413,
      expect.objectContaining({ code: 'too_large', fields: { file: expect.stringContaining('8 MB') } }),
    ])
    sending.destroy()
    server.closeAllConnections()
    await new Promise((resolve) => server.close(resolve))
  })

  it('ends at 500 MB for one child', async () => {
    const full = await buildChild({ therapist })
    await giveConsent(full, 'store_work_samples', therapist)
    const bytes = await picture()
    await database().manager.insert(Sample, storedRow(full, therapist, 500 * 1024 * 1024 - bytes.length))
    expect((await send({ bytes }, full)).status).toBe(201)
    const refused = await send({ bytes }, full)
    expect([refused.status, refused.body.code]).toEqual([413, 'too_large'])
    expect(refused.body.message).toMatch(/500 MB/)
  })

  it('and number end at 100 files a day for one person', async () => {
    const busy = await buildUser('therapist')
    const theirs = await buildChild({ therapist: busy })
    await giveConsent(theirs, 'store_work_samples', busy)
    const client = await signedInAs(busy)
    const rows = Array.from({ length: 99 }, () => storedRow(theirs, busy, 1))
    await database().manager.insert(Sample, rows)
    expect((await upload(client, theirs.id, { bytes: await picture() })).status).toBe(201)
    const refused = await upload(client, theirs.id, { bytes: await picture() })
    expect([refused.status, refused.body.code]).toEqual([429, 'slow_down'])
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0)
  })
})

/** A multipart body as bytes, for what the ordinary client would never send. */
const body = (parts: { name: string; value: string | Buffer; file?: string }[]): Buffer =>
  Buffer.concat([
    ...parts.flatMap(({ name, value, file }) => [
      Buffer.from(
        `--cut\r\nContent-Disposition: form-data; name="${name}"${file ? `; filename="${file}"\r\nContent-Type: image/jpeg` : ''}\r\n\r\n`,
      ),
      Buffer.from(value as string),
      Buffer.from('\r\n'),
    ]),
    Buffer.from('--cut--\r\n'),
  ])
const raw = (bytes: Buffer) =>
  anna
    .post(`/api/children/${child.id}/samples`)
    .set('Content-Type', 'multipart/form-data; boundary=cut')
    .send(bytes)

describe('the form of an upload', () => {
  it.each([
    ['5000 parts', () => Array.from({ length: 5000 }, () => ({ name: 'details', value: '{}' }))],
    ['eleven fields', () => Array.from({ length: 11 }, () => ({ name: 'details', value: '{}' }))],
    [
      'two files',
      () => [
        { name: 'file', value: 'a', file: 'a.jpg' },
        { name: 'file', value: 'b', file: 'b.jpg' },
      ],
    ],
    ['a file under another name', () => [{ name: 'photo', value: 'a', file: 'a.jpg' }]],
    ['details of 70 KB', () => [{ name: 'details', value: 'x'.repeat(70_000) }]],
    ['a field name with brackets', () => [{ name: 'details[a][b]', value: '{}' }]],
    ['a field named like a prototype', () => [{ name: '__proto__', value: '{}' }]],
  ])('is refused with %s', async (_what, parts) => {
    const response = await raw(body(parts()))
    expect([response.status, response.body.code], response.text).toEqual([422, 'invalid'])
  })

  it('is refused when it has no end or no boundary', async () => {
    const whole = body([{ name: 'details', value: '{}' }])
    expect((await raw(whole.subarray(0, whole.length - 12))).status).toBe(400)
    const bare = await anna
      .post(`/api/children/${child.id}/samples`)
      .set('Content-Type', 'multipart/form-data')
      .send('x')
    expect(bare.status).toBe(400)
  })

  it('leaves nothing behind when it is broken off, and the server goes on', async () => {
    const noise = deflateSync(Buffer.from(Array.from({ length: 60_000 }, (_, index) => (index * 7919) % 251)))
    const whole = body([
      { name: 'details', value: JSON.stringify(sampleDetails()) },
      { name: 'file', value: Buffer.concat([await picture(), noise]), file: 'page.jpg' },
    ])
    const before = await stored()
    const server = app.listen(0, '127.0.0.1')
    await new Promise((resolve) => server.once('listening', resolve))
    const { port } = server.address() as AddressInfo
    const breakOff = (at: number) =>
      new Promise<void>((resolve) => {
        const sending = httpRequest({
          port,
          host: '127.0.0.1',
          method: 'POST',
          path: `/api/children/${child.id}/samples`,
          headers: {
            'Content-Type': 'multipart/form-data; boundary=cut',
            'Content-Length': whole.length,
            'X-Fanflower-User': anna.userId,
            'Sec-Fetch-Site': 'same-origin',
            Cookie: anna.cookie.join('; '),
          },
        })
        sending.on('error', () => resolve())
        sending.on('close', () => resolve())
        sending.write(whole.subarray(0, at), () => sending.destroy())
      })
    for (let cut = 0; cut < 50; cut += 1) await breakOff(1 + Math.floor(((whole.length - 2) * cut) / 50))
    server.closeAllConnections()
    await new Promise((resolve) => server.close(resolve))
    expect(await stored()).toBe(before)
    expect((await raw(whole)).status).toBe(201)
    expect(await stored()).toBe(before + 1)
  })
})
