import PDFDocument from 'pdfkit'
import {
  conclusionPlanLabels,
  confidenceLabels,
  handPreferenceLabels,
  type ConclusionContent,
  type SignedEvidence,
} from '../../shared/conclusions.ts'
import { dayOf, formatDay } from '../../shared/days.ts'
import { letterBlocks } from '../../shared/letterText.ts'
import type { LateralLineRow } from '../../shared/lateralLine.ts'
import { assertPrintable, registerFonts } from './letterFonts.ts'
import { heightOf, type Piece, type TextStyle } from './letterLayout.ts'
import { createPages, type Pages } from './letterPages.ts'
import { collect, documentSettings } from './pdfFile.ts'
import { printMeasures } from './reportMeasures.ts'
import { pieceOf, styles } from './reportStyles.ts'

/** A signed conclusion with all that is printed, as it was kept at the signature. */
export interface ReportForPrint {
  content: ConclusionContent
  evidence: SignedEvidence
  /** ISO moment of the author's signature: the report's date, and the only time in the file besides the second one. */
  signedAt: string
  countersigned: { by: string; at: string } | null
}

const title = 'Assessment report'

/**
 * Prints a signed conclusion as a tagged A4 report. The same conclusion gives the same bytes every time. Rejects with
 * UnprintableTextError when a character is in none of the fonts; the signature looks for that before.
 */
export async function renderAssessmentReport(report: ReportForPrint): Promise<Buffer> {
  const { head } = report.evidence
  const pdf = new PDFDocument(
    documentSettings({ title, clinicName: head.clinic.clinicName, at: report.signedAt }),
  )
  const bytes = collect(pdf)
  registerFonts(pdf)
  assertPrintable(pdf, textsOfReport(report))
  const pages = createPages(pdf)
  printHead(pdf, pages, report)
  printConclusion(pdf, pages, report)
  printMeasures(pdf, pages, report.evidence.lateralLine)
  printPlanAndGround(pdf, pages, report)
  printSignatures(pdf, pages, report)
  pages.finish(
    (page, count) => `${head.clinic.clinicName}  ·  ${head.recordNumber}  ·  Page ${page} of ${count}`,
  )
  pdf.end()
  return bytes
}

const rowTexts = ({ measure, informant, basis, caution, cutOffs }: LateralLineRow) =>
  [measure, informant, basis, caution, cutOffs?.name ?? null].filter((text) => text !== null)

/** Every text of the report that is not our own wording here. */
export const textsOfReport = ({ content, evidence, countersigned }: ReportForPrint): string[] => {
  const { head, cautions, contradictions, statements, citations } = evidence
  const { strengths, mattersToChild, reasoning, planDetail, aboutDisagreements } = content
  return [
    ...[head.clinic.clinicName, head.clinic.clinicAddress, head.clinic.clinicPhone],
    ...[head.childName, head.recordNumber, head.author, countersigned?.by ?? ''],
    ...[strengths, mattersToChild, reasoning, planDetail, aboutDisagreements].filter((text) => text !== null),
    ...[...cautions, ...contradictions, ...statements, ...citations],
    ...evidence.evidence.map(({ words }) => words),
    ...evidence.lateralLine.flatMap(rowTexts),
  ]
}

const dayIn = (iso: string, { clinic }: SignedEvidence['head']) =>
  formatDay(dayOf(new Date(iso), clinic.timeZone))

function printHead(pdf: PDFKit.PDFDocument, pages: Pages, { evidence, signedAt }: ReportForPrint) {
  const { head, age, lateralLine } = evidence
  const { clinic } = head
  const days = [
    ...new Set([...lateralLine.map(({ occasion }) => occasion), ...evidence.evidence.map(({ on }) => on)]),
  ]
    .toSorted()
    .map(formatDay)
  const seen =
    days.length < 2
      ? days.map((day) => `Seen and asked: ${day}`)
      : [`Seen and asked: ${days[0]} to ${days.at(-1)}`]
  pages.ornament()
  pages.print([
    pieceOf(pdf, pages, 'P', [clinic.clinicName], styles.clinic, 0),
    pieceOf(
      pdf,
      pages,
      'P',
      [clinic.clinicAddress.split('\n').join(', '), `Phone ${clinic.clinicPhone}`],
      styles.small,
      1,
    ),
  ])
  pages.rule()
  pages.print([
    pieceOf(pdf, pages, 'H1', [title], styles.title, 16),
    pieceOf(
      pdf,
      pages,
      'P',
      [
        `About ${head.childName}. Our reference: ${head.recordNumber}`,
        `Born ${formatDay(head.birthDate)}, ${age} old when this was signed`,
        ...seen,
        `Signed ${dayIn(signedAt, head)}`,
      ],
      styles.body,
      4,
    ),
  ])
}

/** A heading with a text of paragraphs and lists. */
const section = (pdf: PDFKit.PDFDocument, pages: Pages, heading: string, text: string | null): Piece[] => {
  const blocks = letterBlocks(text ?? '')
  if (blocks.length === 0) return []
  const parts = blocks.flatMap((block, index): Piece[] => {
    const before = index === 0 ? 3 : 7
    if (block.kind === 'paragraph') return [pieceOf(pdf, pages, 'P', block.lines, styles.body, before)]
    return block.items.map((item, at) =>
      pieceOf(pdf, pages, 'LI', [item], styles.body, at === 0 ? Math.min(before, 3) : 2),
    )
  })
  return [pieceOf(pdf, pages, 'H2', [heading], styles.heading, 15), ...parts]
}

const listed = (
  pdf: PDFKit.PDFDocument,
  pages: Pages,
  items: readonly string[],
  style: TextStyle = styles.body,
): Piece[] => items.map((item) => pieceOf(pdf, pages, 'LI', [item], style, 2))

function printConclusion(pdf: PDFKit.PDFDocument, pages: Pages, { content, evidence }: ReportForPrint) {
  pages.printOnPanel(section(pdf, pages, 'What goes well', content.strengths))
  pages.print(section(pdf, pages, 'What matters to the child', content.mattersToChild))
  const { handPreference, confidence } = content
  pages.print([
    pieceOf(pdf, pages, 'H2', ['Conclusion'], styles.heading, 15),
    ...(handPreference === null
      ? []
      : [pieceOf(pdf, pages, 'P', [`${handPreferenceLabels[handPreference]}.`], styles.strong, 3)]),
    ...(confidence === null
      ? []
      : [pieceOf(pdf, pages, 'P', [`How sure we are. ${confidenceLabels[confidence]}.`], styles.body, 2)]),
    ...section(pdf, pages, '', content.reasoning).slice(1),
  ])
  const { statements, contradictions } = evidence
  const about = section(pdf, pages, '', content.aboutDisagreements).slice(1)
  const agreement = [
    ...listed(pdf, pages, statements),
    ...(contradictions.length === 0
      ? []
      : [pieceOf(pdf, pages, 'P', ['What did not agree when this was signed:'], styles.body, 7)]),
    ...listed(pdf, pages, contradictions),
    ...(about.length === 0
      ? []
      : [pieceOf(pdf, pages, 'P', ['The therapist on this:'], styles.strong, 7), ...about]),
  ]
  if (agreement.length > 0)
    pages.print([
      pieceOf(pdf, pages, 'H2', ['What agrees and what does not'], styles.heading, 15),
      ...agreement,
    ])
}

function printPlanAndGround(pdf: PDFKit.PDFDocument, pages: Pages, { content, evidence }: ReportForPrint) {
  const { cautions, citations } = evidence
  const heading = (text: string) => pieceOf(pdf, pages, 'H2', [text], styles.heading, 15)
  if (cautions.length > 0)
    pages.print([heading('How to read this'), ...listed(pdf, pages, cautions, styles.note)])
  if (content.plan !== null) {
    const plan = [
      heading('What happens next'),
      pieceOf(pdf, pages, 'P', [`${conclusionPlanLabels[content.plan]}.`], styles.strong, 3),
      ...section(pdf, pages, '', content.planDetail).slice(1),
    ]
    pages.keepTogether(plan.slice(0, 3).reduce((sum, part) => sum + Math.min(heightOf(part), 60), 0))
    pages.print(plan)
  }
  pages.print([
    heading('What this rests on'),
    ...listed(
      pdf,
      pages,
      evidence.evidence.map(({ words }) => words),
    ),
  ])
  if (citations.length > 0)
    pages.print([heading('Methods and sources'), ...listed(pdf, pages, citations, styles.note)])
}

function printSignatures(pdf: PDFKit.PDFDocument, pages: Pages, report: ReportForPrint) {
  const { head } = report.evidence
  const { countersigned } = report
  const pieces = [
    pieceOf(pdf, pages, 'P', [head.author], styles.strong, 20),
    pieceOf(
      pdf,
      pages,
      'P',
      [
        `Occupational therapist, ${head.clinic.clinicName}`,
        `Signed ${dayIn(report.signedAt, head)}`,
        ...(countersigned ? [`Countersigned by ${countersigned.by}, ${dayIn(countersigned.at, head)}`] : []),
      ],
      styles.body,
      0,
    ),
  ]
  pages.keepTogether(pieces.reduce((height, part) => height + heightOf(part), 0))
  pages.print(pieces)
}
