import PDFDocument from 'pdfkit'
import { dayOf, formatDay } from '../../shared/days.ts'
import { letterKindLabels, type LetterKind, type LetterSection } from '../../shared/letters.ts'
import { letterBlocks } from '../../shared/letterText.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import { assertPrintable, registerFonts } from './letterFonts.ts'
import { breakIntoLines, heightOf, type Line, type Piece, type TextStyle } from './letterLayout.ts'
import { createPages, type Pages } from './letterPages.ts'
import { collect, documentSettings } from './pdfFile.ts'

export type Letterhead = Pick<ClinicSettings, 'clinicName' | 'clinicAddress' | 'clinicPhone' | 'timeZone'>

/** An approved letter with all that is printed. Nothing else of the record reaches the page. */
export interface LetterForPrint {
  kind: LetterKind
  childName: string
  recordNumber: string
  /** ISO moment of approval: the letter's date, and the only time in the file, so that the bytes never change. */
  approvedAt: string
  salutation: string
  sections: readonly LetterSection[]
  author: string
  /** Named when somebody other than the author approved. */
  approver: string | null
  clinic: Letterhead
}

const ink = '#1E2235'
const inkSoft = '#565B73'
const petal = '#4A3F8F'

const styles = {
  clinic: { size: 15, weight: 600, leading: 19, colour: petal },
  small: { size: 9.5, weight: 400, leading: 13, colour: inkSoft },
  title: { size: 21, weight: 600, leading: 26, colour: ink },
  heading: { size: 12.5, weight: 600, leading: 17, colour: petal },
  body: { size: 11, weight: 400, leading: 16, colour: ink },
  strong: { size: 11, weight: 600, leading: 16, colour: ink },
} as const satisfies Record<string, TextStyle>

const listIndent = 15

/**
 * Prints an approved letter as a tagged A4 PDF. The same letter gives the same bytes every time, so its SHA-256 can be
 * kept with the approval. Rejects with UnprintableTextError when a character is in none of the fonts.
 */
export async function renderLetterPdf(letter: LetterForPrint): Promise<Buffer> {
  const title = letterKindLabels[letter.kind]
  const pdf = new PDFDocument(
    documentSettings({ title, clinicName: letter.clinic.clinicName, at: letter.approvedAt }),
  )
  const bytes = collect(pdf)
  registerFonts(pdf)
  assertPrintable(pdf, textsOf(letter))
  const pages = createPages(pdf)
  printHead(pdf, pages, letter, title)
  for (const section of letter.sections) printSection(pdf, pages, section)
  printClose(pdf, pages, letter)
  pages.finish(
    (page, count) => `${letter.clinic.clinicName}  ·  ${letter.recordNumber}  ·  Page ${page} of ${count}`,
  )
  pdf.end()
  return bytes
}

/** Every text of the letter: looked through before anything is drawn, so that all odd characters are told at once. */
const textsOf = ({ clinic, sections, ...letter }: LetterForPrint) => [
  ...[clinic.clinicName, clinic.clinicAddress, clinic.clinicPhone],
  ...[letter.childName, letter.recordNumber, letter.salutation, letter.author, letter.approver ?? ''],
  ...sections.flatMap((section) => [section.heading, section.text]),
]

const piece = (
  pdf: PDFKit.PDFDocument,
  pages: Pages,
  tag: Piece['tag'],
  texts: readonly string[],
  style: TextStyle,
  before: number,
): Piece => {
  const indent = tag === 'LI' ? listIndent : 0
  const lines = texts.flatMap((text): Line[] => breakIntoLines(pdf, text, style, pages.width - indent))
  return { tag, style, lines, before, indent }
}

function printHead(pdf: PDFKit.PDFDocument, pages: Pages, letter: LetterForPrint, title: string) {
  const { clinic } = letter
  const address = clinic.clinicAddress.split('\n').join(', ')
  const about = `About ${letter.childName}. Our reference: ${letter.recordNumber}`
  pages.ornament()
  pages.print([
    piece(pdf, pages, 'P', [clinic.clinicName], styles.clinic, 0),
    piece(pdf, pages, 'P', [address, `Phone ${clinic.clinicPhone}`], styles.small, 1),
  ])
  pages.rule()
  pages.print([
    piece(pdf, pages, 'H1', [title], styles.title, 16),
    piece(
      pdf,
      pages,
      'P',
      [about, formatDay(dayOf(new Date(letter.approvedAt), clinic.timeZone))],
      styles.body,
      4,
    ),
    piece(pdf, pages, 'P', [`${letter.salutation},`], styles.body, 18),
  ])
}

function printSection(pdf: PDFKit.PDFDocument, pages: Pages, section: LetterSection) {
  const blocks = letterBlocks(section.text)
  if (blocks.length === 0) return
  const pieces = [piece(pdf, pages, 'H2', [section.heading], styles.heading, 15)]
  for (const [index, block] of blocks.entries()) {
    const before = index === 0 ? 3 : 7
    if (block.kind === 'paragraph') pieces.push(piece(pdf, pages, 'P', block.lines, styles.body, before))
    else {
      for (const [item, text] of block.items.entries())
        pieces.push(piece(pdf, pages, 'LI', [text], styles.body, item === 0 ? Math.min(before, 3) : 2))
    }
  }
  // Strengths stand first and stand out.
  if (section.id === 'strengths') pages.printOnPanel(pieces)
  else pages.print(pieces)
}

function printClose(pdf: PDFKit.PDFDocument, pages: Pages, { author, approver, clinic }: LetterForPrint) {
  const pieces = [
    piece(pdf, pages, 'P', ['With kind regards,'], styles.body, 18),
    piece(pdf, pages, 'P', [author], styles.strong, 10),
    piece(pdf, pages, 'P', [`Occupational therapist, ${clinic.clinicName}`], styles.body, 0),
  ]
  if (approver !== null && approver !== author)
    pieces.push(piece(pdf, pages, 'P', [`Read and approved by ${approver}`], styles.small, 4))
  pages.keepTogether(pieces.reduce((height, part) => height + heightOf(part), 0))
  pages.print(pieces)
}
