import { execFileSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { UnprintableTextError } from '../../server/pdf/letterFonts.ts'
import { renderLetterPdf, type LetterForPrint } from '../../server/pdf/letterPdf.ts'

// Read back with Debian's poppler-utils: a reader that shares no code with the writer.
const folder = mkdtempSync(join(tmpdir(), 'letter-pdf-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

const letter: LetterForPrint = {
  kind: 'progress',
  childName: 'Mara Example',
  recordNumber: 'FF-2026-0001',
  approvedAt: '2026-11-20T23:30:00.000Z',
  salutation: 'Dear Sam Example',
  sections: [
    { id: 'opening', heading: 'When we met', text: 'First paragraph.\n\nSecond paragraph:\n- one\n- two' },
    { id: 'strengths', heading: 'What Mara does well', text: '- Mara draws maps.\n- Mara helps others.' },
    { id: 'school', heading: 'What school is doing', text: '' },
    { id: 'next', heading: 'Next', text: 'Our next visit is on 14 Dec 2026.' },
  ],
  author: 'Ada Writer',
  approver: 'Lea Approver',
  clinic: {
    clinicName: 'Example Children’s Clinic',
    clinicAddress: '3 Example Lane\nExampletown',
    clinicPhone: '01632 960 000',
    timeZone: 'Europe/London',
  },
}

const words = (text: string) => text.split(/\s+/).filter((word) => word !== '' && word !== '•')

async function read(
  printed: LetterForPrint,
  tool: 'pdftotext' | 'pdfinfo' | 'pdffonts',
  ...options: string[]
) {
  const file = join(folder, `${createHash('sha1').update(JSON.stringify(printed)).digest('hex')}.pdf`)
  writeFileSync(file, await renderLetterPdf(printed))
  const target = tool === 'pdftotext' ? [...options, file, '-'] : [...options, file]
  return execFileSync(tool, target, { encoding: 'utf8' })
}

const withText = (text: string): LetterForPrint => ({
  ...letter,
  sections: [{ id: 'opening', heading: 'Heading', text }],
})

describe('renderLetterPdf', () => {
  it('prints every word of the letter once and in order, and leaves an emptied section out', async () => {
    const text = await read(letter, 'pdftotext')
    expect(words(text)).toEqual(
      words(
        [
          'Example Children’s Clinic 3 Example Lane, Exampletown Phone 01632 960 000 Progress letter',
          'About Mara Example. Our reference: FF-2026-0001 20 Nov 2026 Dear Sam Example,',
          'When we met First paragraph. Second paragraph: one two What Mara does well',
          'Mara draws maps. Mara helps others. Next Our next visit is on 14 Dec 2026.',
          'With kind regards, Ada Writer Occupational therapist, Example Children’s Clinic',
          'Read and approved by Lea Approver',
          'Example Children’s Clinic · FF-2026-0001 · Page 1 of 1',
        ].join(' '),
      ),
    )
  })

  it('dates the letter in the clinic’s time zone', async () => {
    const sydney = { ...letter, clinic: { ...letter.clinic, timeZone: 'Australia/Sydney' } }
    expect(await read(sydney, 'pdftotext')).toContain('21 Nov 2026')
  })

  it('does not say that a second person approved when the author did', async () => {
    expect(await read({ ...letter, approver: 'Ada Writer' }, 'pdftotext')).not.toContain('approved by')
  })

  it('is tagged, names its language and has a title without the child’s name', async () => {
    const info = await read(letter, 'pdfinfo')
    expect(info).toMatch(/^Tagged:\s+yes$/m)
    expect(info).toMatch(/^Page size:.*A4/m)
    expect(info).toMatch(/^Title:\s+Progress letter from Example Children’s Clinic$/m)
    expect(info).not.toContain('Mara')
    expect((await renderLetterPdf(letter)).toString('latin1')).toContain('/Lang (en-GB)')
  })

  it('marks title, headings, paragraphs and lists for a screen reader', async () => {
    const structure = await read(letter, 'pdfinfo', '-struct-text')
    const tags = structure
      .split('\n')
      .map((line) => /^\s*(Document|H1|H2|P|L|LI|Lbl|LBody)\b/.exec(line)?.[1])
      .filter((tag) => tag !== undefined)
    expect(tags.slice(0, 6)).toEqual(['Document', 'P', 'P', 'H1', 'P', 'P'])
    expect(tags.filter((tag) => tag === 'H2')).toHaveLength(3)
    expect(tags.filter((tag) => tag === 'L')).toHaveLength(2)
    expect(tags.filter((tag) => tag === 'LI')).toHaveLength(4)
    expect(structure).toMatch(/LBody[^"]*"one"/)
    // Page numbers and decoration are not read aloud.
    expect(structure).not.toContain('Page 1 of 1')
  })

  it('embeds every font it uses', async () => {
    const fonts = (await read(withText('Yavaş'), 'pdffonts')).trim().split('\n').slice(2)
    expect(fonts.length).toBeGreaterThanOrEqual(3)
    for (const font of fonts)
      expect(font).toMatch(/SourceSans3-\S+\s+CID TrueType\s+Identity-H\s+yes yes yes/)
  })

  it.each([
    ['Hungarian', 'Erdős'],
    ['Polish', 'Sroka-Łuczak, Zieliński, Michał'],
    ['Turkish', 'Dilan Yavaş, Emre Kocabaş, İpek'],
    ['accents', 'Inés, Lucía, Siobhán, Zoë'],
    ['dashes, quotes and a minus', '5–9 “so” ‘it’ goes … −2'],
    ['Vietnamese', 'Nguyễn Thị Hồng'],
    ['Greek', 'Ελένη'],
    ['Cyrillic', 'Данаилов'],
  ])('prints %s', async (_what, text) => {
    expect(words(await read(withText(text), 'pdftotext')).join(' ')).toContain(text)
  })

  it('joins an accent typed apart to its letter', async () => {
    expect(await read(withText('Rene\u0301'), 'pdftotext')).toContain('René')
  })

  it('keeps a word in two font files on one line', async () => {
    const text = `${'Yavaş '.repeat(200)}`.trim()
    expect(words(await read(withText(text), 'pdftotext')).filter((word) => word === 'Yavaş')).toHaveLength(
      200,
    )
  })

  it('refuses characters no font has, naming each once, wherever they stand', async () => {
    const odd = { ...withText('Well done 🌟, 🌟 and نور'), salutation: 'Dear 曹' }
    const failure = await renderLetterPdf(odd).then(
      () => null,
      (error: unknown) => error,
    )
    expect(failure).toBeInstanceOf(UnprintableTextError)
    expect((failure as UnprintableTextError).characters.toSorted()).toEqual(
      ['曹', '🌟', 'ن', 'و', 'ر'].toSorted(),
    )
  })

  it('gives the same bytes each time, and others when the approval is another', async () => {
    const once = await renderLetterPdf(letter)
    await new Promise((resolve) => setImmediate(resolve))
    expect((await renderLetterPdf(letter)).equals(once)).toBe(true)
    expect((await renderLetterPdf({ ...letter, approvedAt: '2026-11-21T09:00:00.000Z' })).equals(once)).toBe(
      false,
    )
  })

  it('loses no word and numbers every page when a letter is long', async () => {
    const paragraph = (n: number) => Array.from({ length: 60 }, (_, word) => `w${n}x${word}`).join(' ')
    const items = Array.from({ length: 40 }, (_, n) => `- ${paragraph(n)}`).join('\n')
    const text = `${items}\n\n${Array.from({ length: 20 }, (_, n) => paragraph(100 + n)).join('\n\n')}`
    const long = withText(text)
    const printed = words(await read(long, 'pdftotext'))
    expect(printed.filter((word) => /^w\d+x\d+$/.test(word))).toEqual(words(text.replaceAll('- ', '')))
    const pages = Number(/^Pages:\s+(\d+)$/m.exec(await read(long, 'pdfinfo'))?.[1])
    expect(pages).toBeGreaterThan(3)
    expect(printed.join(' ')).toContain(`Page ${pages} of ${pages}`)
  })

  it('cuts a word wider than the page instead of running off it', async () => {
    const address = `https://clinic.example/${'a'.repeat(300)}`
    const box = await read(withText(address), 'pdftotext', '-bbox')
    const rightEdges = [...box.matchAll(/xMax="([\d.]+)"/g)].map(([, x]) => Number(x))
    expect(Math.max(...rightEdges)).toBeLessThan(595.28 - 50)
  })
})
