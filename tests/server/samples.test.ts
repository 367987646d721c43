import { createHash, randomUUID } from 'node:crypto'
import sharp from 'sharp'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { setClock } from '../../server/clock.ts'
import { createDataSource, database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import type { SampleView, SampleWallView } from '../../shared/samples.ts'
import { signedInAs, startApp, stopApp, type Client } from '../support/app.ts'
import { testDatabaseAccess } from '../support/database.ts'
import { buildChild, buildClass, buildGuardian, buildUser, giveConsent } from '../support/factories.ts'
import { pdfOf } from '../support/pdfs.ts'
import { heldAs, isDark, picture, withSecrets } from '../support/pictures.ts'
import { sampleDetails, upload, type Upload } from '../support/uploads.ts'

beforeAll(startApp)
afterAll(async () => {
  setClock(() => new Date())
  await stopApp()
})

let therapist: User
let anna: Client
let child: Child

beforeAll(async () => {
  setClock(() => new Date('2026-06-10T09:00:00Z'))
  therapist = await buildUser('therapist', { displayName: 'Adaeze Nwosu-Reid' })
  anna = await signedInAs(therapist)
})

beforeEach(async () => {
  child = await buildChild({ therapist, birthDate: '2018-05-04' })
  await giveConsent(child, 'store_work_samples', therapist)
})

const at = (path = '', of: Pick<Child, 'id'> = child) => `/api/children/${of.id}/samples${path}`
const added = async (given: Upload): Promise<SampleView> => {
  const response = await upload(anna, child.id, given)
  expect(response.status, response.text).toBe(201)
  return response.body
}
const wall = async (): Promise<SampleWallView> => (await anna.get(at())).body
const download = async (id: string, part = 'file', by = anna) => {
  const response = await by
    .get(at(`/${id}/${part}`))
    .buffer(true)
    .parse((res, done) => {
      const parts: Buffer[] = []
      res.on('data', (bytes: Buffer) => parts.push(bytes))
      res.on('end', () => done(null, Buffer.concat(parts)))
    })
  return { response, bytes: response.body as Buffer }
}
const sha256 = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex')

describe('a handwriting sample', () => {
  it('is stored as our own encoding with both hashes, and listed with its measures in words', async () => {
    const original = await picture('jpeg', 300)
    const sample = await added({ bytes: original })
    expect(sample).toMatchObject({
      childId: child.id,
      takenOn: '2026-06-09',
      ageThen: '8 y 1 m',
      contentType: 'image/jpeg',
      width: 96,
      height: 64,
      lettersPerMinute: 58,
      uploadedBy: 'Adaeze Nwosu-Reid',
      can: { remove: true },
    })
    expect(sample.pixelsPerMm).toBeCloseTo(300 / 25.4, 3)
    expect(sample.percentLegible).toBeCloseTo((100 * 107) / 116, 9)
    expect(sample.alt).toBe(
      'Handwriting of 9 Jun 2026 at 8 y 1 m: copying a sentence, separate letters, 58 letters a minute, 92% readable',
    )
    const { bytes } = await download(sample.id)
    const [row] = (await database().query('SELECT sha256, originalSha256, bytes FROM samples WHERE id = ?', [
      sample.id,
    ])) as {
      sha256: Buffer
      originalSha256: Buffer
      bytes: number
    }[]
    expect(row?.sha256.toString('hex')).toBe(sha256(bytes))
    expect(row?.originalSha256.toString('hex')).toBe(sha256(original))
    expect([row?.bytes, sample.bytes]).toEqual([bytes.length, bytes.length])
  })

  it.each([
    ['JPEG', 'jpeg', 'page.JPG', 'image/jpeg'],
    ['PNG', 'png', 'page.png', 'image/png'],
    ['WebP', 'webp', 'page.webp', 'image/webp'],
  ] as const)(
    'may be %s, and comes back as such with a small JPEG beside it',
    async (_what, format, name, type) => {
      const sample = await added({ bytes: await picture(format), name, type })
      expect(sample).toMatchObject({ contentType: type, pixelsPerMm: null })
      const file = await download(sample.id)
      expect(file.response.headers['content-type']).toBe(type)
      expect(await sharp(file.bytes).metadata()).toMatchObject({ format, width: 96, height: 64 })
      const small = await download(sample.id, 'thumbnail')
      expect(small.response.headers['content-type']).toBe('image/jpeg')
      expect((await sharp(small.bytes).metadata()).width).toBe(96)
    },
  )

  it('may be a PDF, which has no small picture and is always saved, never shown in place', async () => {
    const sample = await added({ bytes: pdfOf(), name: 'scan.pdf', type: 'application/pdf' })
    expect(sample).toMatchObject({ contentType: 'application/pdf', width: null, height: null })
    expect(sample.alt).toMatch(/^Scanned handwriting \(PDF\)/)
    const { response, bytes } = await download(sample.id)
    expect(response.headers['content-disposition']).toMatch(/^attachment; /)
    expect(bytes.toString('latin1')).toContain('(hello) Tj')
    expect((await download(sample.id, 'thumbnail')).response.status).toBe(404)
  })

  it.each([1, 2, 3, 4, 5, 6, 7, 8])(
    'is stored upright when the camera was held in way %i',
    async (orientation) => {
      const { id } = await added({ bytes: await heldAs(orientation) })
      const { bytes } = await download(id)
      const { data, info } = await sharp(bytes).greyscale().raw().toBuffer({ resolveWithObject: true })
      expect([info.width, info.height]).toEqual([96, 64])
      const wrong = [8, 24, 40, 56, 72, 88].flatMap((x) =>
        [4, 12, 28, 44, 60].filter((y) => (data[y * info.width + x] ?? 0) < 128 !== isDark(x, y)),
      )
      expect(wrong).toEqual([])
      expect((await sharp(bytes).metadata()).orientation).toBeUndefined()
    },
  )

  it.each(['jpeg', 'webp'] as const)(
    'keeps no place, name, description or trailing byte of a %s',
    async (format) => {
      const original = await withSecrets(format)
      expect((await sharp(original).metadata()).exif).toBeDefined()
      expect(original.includes('Canary')).toBe(true)
      const { id } = await added({ bytes: original, name: `page.${format}`, type: `image/${format}` })
      const { bytes } = await download(id)
      const small = await download(id, 'thumbnail')
      for (const kept of [bytes, small.bytes]) {
        expect(kept.includes('Canary')).toBe(false)
        const { exif, xmp, iptc, icc } = await sharp(kept).metadata()
        expect([exif, xmp, iptc, icc]).toEqual([undefined, undefined, undefined, undefined])
      }
    },
  )

  it('is listed in the order it was written, whatever the order of upload', async () => {
    for (const takenOn of ['2026-03-01', '2025-11-20', '2026-06-01'])
      await added({ bytes: await picture(), details: sampleDetails({ takenOn }) })
    expect((await wall()).samples.map((sample) => sample.takenOn)).toEqual([
      '2025-11-20',
      '2026-03-01',
      '2026-06-01',
    ])
  })

  it('shows nothing where nothing was counted', async () => {
    const details = sampleDetails({ letters: null, legibleLetters: null, seconds: null })
    expect(await added({ bytes: await picture(), details })).toMatchObject({
      lettersPerMinute: null,
      percentLegible: null,
      alt: 'Handwriting of 9 Jun 2026 at 8 y 1 m: copying a sentence, separate letters',
    })
  })
})

describe('a stored file', () => {
  it('is served so that it can only be looked at, under a name of our own', async () => {
    const hostile = '"><x>\r\n..\\/é.jpg'
    const { id } = await added({ bytes: await picture(), name: hostile })
    const { response } = await download(id)
    expect(response.headers).toMatchObject({
      'content-type': 'image/jpeg',
      'x-content-type-options': 'nosniff',
      'content-security-policy': "default-src 'none'; sandbox",
      'content-disposition': `inline; filename="handwriting-2026-06-09-${child.recordNumber}.jpg"`,
      'cache-control': 'no-store',
      'cross-origin-resource-policy': 'same-origin',
    })
    const [row] = (await database().query('SELECT * FROM samples WHERE id = ?', [id])) as Record<
      string,
      unknown
    >[]
    expect(JSON.stringify({ ...row, content: null, thumbnail: null })).not.toContain('<x>')
  })

  it('is not handed out when a byte of it changed in storage; the trail says so', async () => {
    const { id } = await added({ bytes: await picture() })
    const owner = createDataSource(testDatabaseAccess().migrate)
    await owner.initialize()
    const [guard] = (await owner.query('SHOW CREATE TRIGGER samples_keep')) as Record<string, string>[]
    await owner.query('DROP TRIGGER samples_keep')
    await owner.query(
      "UPDATE samples SET content = CONCAT(LEFT(content, 40), 'X', SUBSTRING(content, 42)) WHERE id = ?",
      [id],
    )
    await owner.query(guard?.['SQL Original Statement'] ?? '')
    await owner.destroy()

    const refused = await anna.get(at(`/${id}/file`))
    expect([refused.status, refused.body.code]).toEqual([409, 'damaged'])
    const entries = await database().query(
      "SELECT 1 FROM audit_entries WHERE action = 'sample.damaged' AND objectId = ?",
      [id],
    )
    expect(entries).toHaveLength(1)
  })

  it('cannot be changed or removed in the database by the running server', async () => {
    const { id } = await added({ bytes: await picture() })
    await expect(database().query("UPDATE samples SET content = 'x' WHERE id = ?", [id])).rejects.toThrow(
      /never changed/,
    )
    await expect(database().query('DELETE FROM samples WHERE id = ?', [id])).rejects.toThrow()
  })
})

describe('sending a sample twice', () => {
  it('makes one sample for one key, five times at once and once more', async () => {
    const key = randomUUID()
    const bytes = await picture()
    const answers = await Promise.all([1, 2, 3, 4, 5].map(() => upload(anna, child.id, { bytes, key })))
    answers.push(await upload(anna, child.id, { bytes, key }))
    expect(answers.map((answer) => answer.status)).toEqual(Array(6).fill(201))
    expect(new Set(answers.map((answer) => answer.body.id)).size).toBe(1)
    expect((await wall()).samples).toHaveLength(1)
    const other = await upload(anna, child.id, { bytes: await picture('jpeg', 300), key })
    expect(other.status).toBe(422)
  })

  it('makes two samples for two keys', async () => {
    const bytes = await picture()
    for (const key of [randomUUID(), randomUUID()]) await upload(anna, child.id, { bytes, key })
    expect((await wall()).samples).toHaveLength(2)
  })
})

describe('the details of a sample', () => {
  it.each([
    ['a day to come', { takenOn: '2026-06-11' }, 'takenOn'],
    ['a day before birth', { takenOn: '2018-05-03' }, 'takenOn'],
    ['another child’s name in view', { otherChildVisible: true }, 'otherChildVisible'],
    ['more readable letters than letters', { letters: 10, legibleLetters: 11 }, 'legibleLetters'],
    ['no task', { task: 'sonnet' }, 'task'],
    ['a hash of its own', { sha256: 'ab' }, 'form'],
  ])('are refused with %s, beside the field', async (_what, given, field) => {
    const response = await upload(anna, child.id, {
      bytes: await picture(),
      details: { ...sampleDetails(), ...given },
    })
    expect(response.status).toBe(422)
    expect(Object.keys(response.body.fields)).toEqual([field])
    expect((await wall()).samples).toEqual([])
  })

  it('must be there, readable and alone, and so must the file', async () => {
    const bytes = await picture()
    const without = await anna.post(at()).attach('file', bytes, 'page.jpg')
    expect(without.body.fields.details).toBeDefined()
    const broken = await anna.post(at()).field('details', '{').attach('file', bytes, 'page.jpg')
    expect(broken.body.fields.details).toBeDefined()
    const more = await anna
      .post(at())
      .field('details', '{}')
      .field('childId', 'x')
      .attach('file', bytes, 'page.jpg')
    expect(more.body.fields.form).toContain('childId')
    const noFile = await anna.post(at()).field('details', JSON.stringify(sampleDetails()))
    expect(noFile.body.fields.file).toBeDefined()
    const json = await anna.post(at()).send(sampleDetails())
    expect(json.status).toBe(422)
  })
})

describe('consent to keep pictures', () => {
  it('is needed to add one, and the page says so; what is there stays', async () => {
    await added({ bytes: await picture() })
    await database().query('UPDATE children SET preferredName = NULL WHERE id = ?', [child.id])
    const [given] = (await database().query('SELECT id FROM consents WHERE childId = ?', [child.id])) as {
      id: string
    }[]
    await giveConsent(child, 'store_work_samples', therapist, {
      kind: 'withdrawn',
      withdrawsId: given?.id ?? null,
    })
    const refused = await upload(anna, child.id, { bytes: await picture() })
    expect([refused.status, refused.body.code]).toEqual([409, 'consent_needed'])
    const shown = await wall()
    expect(shown.blocked).toMatch(/No consent for keeping pictures/)
    expect(shown.can.add).toBe(false)
    expect(shown.samples).toHaveLength(1)
  })
})

describe('who may see, add and remove samples', () => {
  it('lets the therapist take one off the record; it is then found nowhere', async () => {
    const { id } = await added({ bytes: await picture() })
    expect((await anna.delete(at(`/${id}`))).status).toBe(204)
    for (const path of ['/file', '/thumbnail']) expect((await anna.get(at(`/${id}${path}`))).status).toBe(404)
    expect((await anna.delete(at(`/${id}`))).status).toBe(404)
    expect((await wall()).samples).toEqual([])
  })

  it('lets the clinic lead look, and refuses the lead’s adding and removing', async () => {
    const { id } = await added({ bytes: await picture() })
    const lead = await signedInAs(await buildUser('clinicLead'))
    const shown: SampleWallView = (await lead.get(at())).body
    expect(shown.can.add).toBe(false)
    expect(shown.samples[0]?.can.remove).toBe(false)
    expect((await download(id, 'file', lead)).response.status).toBe(200)
    expect((await upload(lead, child.id, { bytes: await picture() })).status).toBe(403)
    expect((await lead.delete(at(`/${id}`))).status).toBe(403)
  })

  it('looks like nothing to everybody else', async () => {
    const { id } = await added({ bytes: await picture() })
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
        await client.get(at(`/${id}/file`)),
        await client.get(at(`/${id}/thumbnail`)),
        await client.delete(at(`/${id}`)),
        await upload(client, child.id, { bytes: await picture() }),
      ]
      for (const answer of answers)
        expect([answer.status, answer.body.code], other.roles[0]).toEqual([404, 'not_found'])
    }
    expect((await wall()).samples).toHaveLength(1)
  })

  it('finds a sample only under its own child', async () => {
    const { id } = await added({ bytes: await picture() })
    const other = await buildChild({ therapist })
    for (const path of [`/${id}/file`, `/${id}/thumbnail`])
      expect((await anna.get(at(path, other))).status).toBe(404)
    expect((await anna.delete(at(`/${id}`, other))).status).toBe(404)
    expect((await wall()).samples).toHaveLength(1)
  })

  it('leaves an audit entry for each act, with the hash of the original', async () => {
    const original = await picture()
    const { id } = await added({ bytes: original })
    await download(id)
    await download(id, 'thumbnail')
    await wall()
    await anna.delete(at(`/${id}`))
    const entries = (await database().query(
      'SELECT action, detail FROM audit_entries WHERE childId = ? ORDER BY position',
      [child.id],
    )) as { action: string; detail: unknown }[]
    expect(entries.map((entry) => entry.action)).toEqual([
      'sample.added',
      'sample.file',
      'sample.thumbnail',
      'samples.list',
      'sample.removed',
    ])
    expect(JSON.stringify(entries[0]?.detail)).toContain(sha256(original))
  })
})
