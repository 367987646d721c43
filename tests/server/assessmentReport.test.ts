import { execFileSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { renderAssessmentReport, type ReportForPrint } from '../../server/pdf/assessmentReport.ts'
import { UnprintableTextError } from '../../server/pdf/letterFonts.ts'
import { lateralRow, lateralRows, reportContent, reportForPrint } from '../support/reports.ts'

// Read back with Debian's poppler-utils: a reader that shares no code with the writer.
const folder = mkdtempSync(join(tmpdir(), 'assessment-report-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

const words = (text: string) => text.split(/\s+/).filter((word) => word !== '' && word !== '•')

async function read(
  report: ReportForPrint,
  tool: 'pdftotext' | 'pdfinfo' | 'pdffonts',
  ...options: string[]
) {
  const file = join(folder, `${createHash('sha1').update(JSON.stringify(report)).digest('hex')}.pdf`)
  writeFileSync(file, await renderAssessmentReport(report))
  const target = tool === 'pdftotext' ? [...options, file, '-'] : [...options, file]
  return execFileSync(tool, target, { encoding: 'utf8' })
}

const report = reportForPrint()
const withRows = (lateralLine: ReportForPrint['evidence']['lateralLine']): ReportForPrint => ({
  ...report,
  evidence: { ...report.evidence, lateralLine },
})
const pagesOf = async (printed: ReportForPrint) =>
  Number(/^Pages:\s+(\d+)$/m.exec(await read(printed, 'pdfinfo'))?.[1])

describe('renderAssessmentReport', () => {
  it('says whose report it is, with strengths before the conclusion and every part under its heading', async () => {
    const text = words(await read(report, 'pdftotext')).join(' ')
    const order = [
      'Example Children’s Clinic 3 Example Lane, Exampletown Phone 01632 960 000 Assessment report',
      'About Mara Example. Our reference: FF-2026-0001',
      'Born 9 Jan 2018, 8 y 1 m old when this was signed',
      'Seen and asked: 2 Sep 2025 to 3 Mar 2026 Signed 10 Mar 2026',
      'What goes well Mara draws maps with many small signs. Mara stays with a task until it works.',
      'What matters to the child To finish a comic by herself.',
      'Conclusion Coming to prefer the left hand. How sure we are. Medium: most of what was seen agrees.',
      'Asked and seen, the left hand is chosen for nearly everything.',
      'What agrees and what does not The questionnaires agree on the left hand.',
      'The right hand does better at Moving pegs of 3 Mar 2026: +6.4.',
      'The therapist on this: Pegs were new to her; the right hand went second and had the practice.',
      'The lateral line',
      'Left',
      'Right',
      'The measures as figures',
      'How to read this Preference and skill are different things and are not averaged.',
      'What happens next Advice for home and school.',
      'Page turned clockwise. Left-handed scissors.',
      'What this rests on Reaching across the midline, 3 Mar 2026: 14 left, 7 right',
      'Methods and sources Oldfield RC. 1971. Neuropsychologia 9:97-113.',
      'Ada Writer Occupational therapist, Example Children’s Clinic Signed 10 Mar 2026',
      'Countersigned by Lea Approver, 11 Mar 2026',
    ]
    let from = 0
    for (const part of order) {
      const at = text.indexOf(part, from)
      expect(at, part).toBeGreaterThanOrEqual(from)
      from = at + part.length
    }
  })

  it('puts value, side, interval or chance band, occasion and basis of every measure into the table', async () => {
    const text = words(await read(report, 'pdftotext', '-layout')).join(' ')
    for (const part of ['−88.2', '−46.7', '−33.3', '+6.4', '+1.2 to +11.6', '2 Sep 2025', 'Not scorable'])
      expect(text).toContain(part)
    const structure = await read(report, 'pdfinfo', '-struct-text')
    expect(structure).toMatch(
      /TD[^"]*"By chance −42\.9 to "\s+"\+42\.9"|TD[^"]*"By chance −42\.9 to \+42\.9"/,
    )
    expect(structure).toContain('21 reaches')
  })

  it('is tagged, names its language and has a title without the child’s name', async () => {
    const info = await read(report, 'pdfinfo')
    expect(info).toMatch(/^Tagged:\s+yes$/m)
    expect(info).toMatch(/^Page size:.*A4/m)
    expect(info).toMatch(/^Title:\s+Assessment report from Example Children’s Clinic$/m)
    expect(info).not.toContain('Mara')
    expect((await renderAssessmentReport(report)).toString('latin1')).toContain('/Lang (en-GB)')
  })

  it('marks headings, lists, the table and the picture for a screen reader', async () => {
    const structure = await read(report, 'pdfinfo', '-struct-text')
    const tags = structure
      .split('\n')
      .map((line) => /^\s*(Document|H1|H2|P|L|LI|Figure|Table|TR|TH|TD)\b/.exec(line)?.[1])
      .filter((tag) => tag !== undefined)
    const count = (wanted: string) => tags.filter((tag) => tag === wanted).length
    expect(count('H1')).toBe(1)
    expect(count('H2')).toBe(10)
    expect(count('Figure')).toBe(1)
    expect(count('Table')).toBe(1)
    // One row of headings, one for each measure; five columns, the first of which names the row.
    expect(count('TR')).toBe(1 + lateralRows().length)
    expect(count('TH')).toBe(5 + lateralRows().length)
    expect(count('TD')).toBe(4 * lateralRows().length)
    expect(structure).toMatch(/Scope:? ?\/?Column/i)
    expect(structure).not.toContain('Page 1 of')
  })

  it('tells the picture in words: the ends of the line and the newest value of each measure', async () => {
    // poppler prints no alternative text; it is read from the file's own objects.
    const bytes = (await renderAssessmentReport(report)).toString('latin1')
    const stored = [...bytes.matchAll(/\/Alt \(((?:\\.|[^\\)])*)\)/gs)].map(([, raw]) =>
      Buffer.from((raw ?? '').replace(/\\([()\\])/g, '$1').replaceAll('\\r', '\r'), 'latin1'),
    )
    expect(stored).toHaveLength(1)
    const text = stored[0]?.subarray(2).swap16().toString('utf16le') ?? ''
    expect(text).toContain('from −100, always the left hand, to +100, always the right hand')
    expect(text).toContain('Hand use in ten everyday activities (parent or carer), 3 Mar 2026: −88.2, left')
    expect(text).toContain('Hand use in ten everyday activities (teacher), 3 Mar 2026: not scorable')
    expect(text).toContain('Reaching across the midline, 3 Mar 2026: −33.3, within chance')
    expect(text).toContain('Earlier occasions drawn lighter: 1.')
  })

  it('embeds Source Sans 3 and nothing else', async () => {
    const fonts = (await read(report, 'pdffonts')).trim().split('\n').slice(2)
    expect(fonts.length).toBeGreaterThanOrEqual(2)
    for (const font of fonts)
      expect(font).toMatch(/SourceSans3-\S+\s+CID TrueType\s+Identity-H\s+yes yes yes/)
  })

  it('gives the same bytes each time, and others when a countersignature was added', async () => {
    const once = await renderAssessmentReport(report)
    await new Promise((resolve) => setImmediate(resolve))
    expect((await renderAssessmentReport(report)).equals(once)).toBe(true)
    expect((await renderAssessmentReport({ ...report, countersigned: null })).equals(once)).toBe(false)
  })

  it('leaves the line, its table and empty parts out when nothing was measured', async () => {
    const text = await read(
      { ...withRows([]), content: reportContent({ planDetail: null, aboutDisagreements: null }) },
      'pdftotext',
    )
    expect(text).not.toContain('The lateral line')
    expect(text).not.toContain('The measures as figures')
    expect(text).not.toContain('The therapist on this')
  })

  it('loses no word and numbers every page when texts are long', async () => {
    const paragraph = (n: number) => Array.from({ length: 60 }, (_, word) => `w${n}x${word}`).join(' ')
    const reasoning = Array.from({ length: 30 }, (_, n) => paragraph(n)).join('\n\n')
    const planDetail = Array.from({ length: 20 }, (_, n) => `- ${paragraph(100 + n)}`).join('\n')
    const long = { ...report, content: reportContent({ reasoning, planDetail }) }
    const printed = words(await read(long, 'pdftotext'))
    expect(printed.filter((word) => /^w\d+x\d+$/.test(word))).toEqual(
      words(`${reasoning} ${planDetail.replaceAll('- ', '')}`),
    )
    const pages = await pagesOf(long)
    expect(pages).toBeGreaterThan(4)
    for (let page = 1; page <= pages; page += 1)
      expect(printed.join(' ')).toContain(`Page ${page} of ${pages}`)
  })

  it.each([0, 1, 2, 3, 4])(
    'leaves no bullet and no heading behind at the foot of a page, %i lines further down',
    async (down) => {
      // Three lines each: the place on the page moves by 50 points from item to item and from section to section.
      const item = (n: number) => `item${n} ${Array.from({ length: 44 }, (_, at) => `w${at}`).join(' ')}`
      const statements = Array.from({ length: 45 }, (_, n) => item(n))
      const planDetail = Array.from({ length: 45 }, (_, n) => `- ${item(100 + n)}`).join('\n')
      const matters = Array.from({ length: down + 1 }, (_, n) => `line${n}`).join('\n')
      const long = {
        ...report,
        content: reportContent({ planDetail, mattersToChild: matters }),
        evidence: { ...report.evidence, statements, lateralLine: [] },
      }
      const pages = (await read(long, 'pdftotext', '-layout'))
        .split('\f')
        .filter((page) => page.trim() !== '')
      expect(pages.length).toBeGreaterThan(5)
      const headings = /^(What|Conclusion|How|Methods)[a-z ]*$/
      for (const page of pages) {
        const lines = page.split('\n').filter((line) => line.trim() !== '')
        const last = lines.at(-2)?.trim() ?? ''
        expect(last).not.toBe('•')
        expect(last).not.toMatch(headings)
      }
    },
  )

  it('goes on with picture and table on further pages, headings repeated, when there are many measures', async () => {
    const many = Array.from({ length: 60 }, (_, n) =>
      lateralRow({
        id: `row-${n}`,
        track: `track-${n}`,
        measure: `Measure m${n}m`,
        basis: `b${n}b answered`,
      }),
    )
    const structure = await read(withRows(many), 'pdfinfo', '-struct-text')
    expect(structure.match(/^\s*Figure\b/gm)?.length).toBeGreaterThan(1)
    const text = words(await read(withRows(many), 'pdftotext'))
    for (let n = 0; n < 60; n += 1) {
      expect(text).toContain(`m${n}m`)
      expect(text).toContain(`b${n}b`)
    }
    expect(text.filter((word) => word === 'Interval').length).toBeGreaterThan(1)
    // The repeated headings are for the eye: the table itself has its one row of them.
    expect(structure.match(/"Interval"/g)).toHaveLength(1)
  })

  it('cuts a cell higher than a page into further rows', async () => {
    const basis = Array.from({ length: 700 }, (_, n) => `c${n}c`).join(' ')
    const tall = withRows([lateralRow({ basis })])
    const text = words(await read(tall, 'pdftotext')).filter((word) => /^c\d+c$/.test(word))
    expect(text).toEqual(words(basis))
  })

  it('runs over neither edge of the paper', async () => {
    const address = `https://clinic.example/${'a'.repeat(300)}`
    const box = await read(
      { ...report, content: reportContent({ reasoning: address }) },
      'pdftotext',
      '-bbox',
    )
    expect(Math.max(...[...box.matchAll(/xMax="([\d.]+)"/g)].map(([, x]) => Number(x)))).toBeLessThan(
      595.28 - 50,
    )
    expect(Math.max(...[...box.matchAll(/yMax="([\d.]+)"/g)].map(([, y]) => Number(y)))).toBeLessThan(
      841.89 - 25,
    )
  })

  it('refuses characters no font has, naming each once', async () => {
    const odd = { ...report, content: reportContent({ strengths: 'Well done 🌟 🌟' }) }
    const failure = await renderAssessmentReport(odd).then(
      () => null,
      (error: unknown) => error,
    )
    expect(failure).toBeInstanceOf(UnprintableTextError)
    expect((failure as UnprintableTextError).characters).toEqual(['🌟'])
  })
})
