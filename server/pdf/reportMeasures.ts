import { formatDay } from '../../shared/days.ts'
import { formatQuotient } from '../../shared/laterality.ts'
import { rowName, sideWords, tracksOf, type LateralLineRow } from '../../shared/lateralLine.ts'
import { printLateralLine, valueInWords } from './lateralPicture.ts'
import { heightOf } from './letterLayout.ts'
import type { Pages } from './letterPages.ts'
import { pieceOf, styles } from './reportStyles.ts'
import { printTable } from './reportTable.ts'

const key = (rows: readonly LateralLineRow[]): string => {
  const sets = new Map(rows.flatMap(({ cutOffs }) => (cutOffs ? [[cutOffs.name, cutOffs] as const] : [])))
  const parts = [
    'The flat edge of a half petal stands on the value; its round side points to the hand.',
    rows.some(({ interval }) => interval) ? 'A bar under a mark is its 95\u00a0% interval.' : null,
    rows.some(({ chance }) => chance) ? 'Inside a hatched band the choice of hand may be chance.' : null,
    ...[...sets.values()].map(({ name, left, right, inclusive }) => {
      const [up, from] = inclusive ? ['up to', 'from'] : ['below', 'above']
      return `Tinted ends: ${name} (left ${up} ${formatQuotient(left)}, right ${from} ${formatQuotient(right)}).`
    }),
    rows.some(({ latest }) => !latest) ? 'Dashed marks are earlier occasions.' : null,
  ]
  return parts.filter((part) => part !== null).join(' ')
}

const span = ({ low, high }: { low: number; high: number }) =>
  `${formatQuotient(low)} to ${formatQuotient(high)}`

const rowOf = (row: LateralLineRow): string[] => [
  rowName(row),
  formatDay(row.occasion),
  row.value === null ? sideWords(row) : valueInWords(row),
  [
    row.interval ? span(row.interval) : null,
    row.chance ? `By chance ${span(row.chance)}` : null,
    !row.interval && !row.chance ? 'None given' : null,
  ]
    .filter((part) => part !== null)
    .join('. '),
  row.caution === null ? row.basis : `${row.basis}. ${row.caution}`,
]

/** The lateral line as a picture with its key, then every figure in a table. Nothing when nothing was measured. */
export function printMeasures(pdf: PDFKit.PDFDocument, pages: Pages, rows: readonly LateralLineRow[]): void {
  if (rows.length === 0) return
  const lead = [
    pieceOf(pdf, pages, 'H2', ['The lateral line'], styles.heading, 15),
    pieceOf(
      pdf,
      pages,
      'P',
      ['Every measure on one line, from −100 (always the left hand) to +100 (always the right hand).'],
      styles.body,
      3,
    ),
  ]
  printLateralLine(pdf, pages, rows, {
    height: lead.reduce((sum, piece) => sum + heightOf(piece), 0),
    print: () => pages.print(lead),
  })
  pages.print([pieceOf(pdf, pages, 'P', [key(rows)], styles.small, 5)])
  const heading = pieceOf(pdf, pages, 'H2', ['The measures as figures'], styles.heading, 15)
  // Room for the table's own headings and a first row.
  pages.keepTogether(heightOf(heading) + 70)
  pages.print([heading])
  printTable(pdf, pages, {
    columns: [
      { title: 'Measure', share: 0.26 },
      { title: 'When', share: 0.13 },
      { title: 'Value', share: 0.2 },
      { title: 'Interval', share: 0.17 },
      { title: 'Rests on', share: 0.24 },
    ],
    rows: tracksOf(rows).flatMap((track) => track.rows.map(rowOf)),
  })
}
