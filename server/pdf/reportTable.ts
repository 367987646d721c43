import { breakIntoLines, drawLine, type Line, type TextStyle } from './letterLayout.ts'
import type { Pages, Place } from './letterPages.ts'
import { colours, styles } from './reportStyles.ts'

export interface ReportTable {
  columns: { title: string; /** Share of the page's width, 0 to 1. */ share: number }[]
  /** One text for each column; the first names the row. */
  rows: string[][]
}

interface Cell {
  lines: Line[]
  /** Left edge within the column of text, in points. */
  x: number
  style: TextStyle
}

const gutter = 8
const padding = 4

// pdfkit knows the scope of a heading cell; its published types do not yet.
const scoped = (scope: 'Column' | 'Row'): object => ({ scope })

/** Sets a table with its headings tagged, rows kept whole, and the headings said again on each further page. */
export function printTable(pdf: PDFKit.PDFDocument, pages: Pages, { columns, rows }: ReportTable): void {
  const edges = columns.map((_, index) =>
    columns.slice(0, index).reduce((sum, { share }) => sum + share * pages.width, 0),
  )
  const cellsOf = (texts: readonly string[], styleOf: (index: number) => TextStyle): Cell[] =>
    columns.map(({ share }, index) => {
      const style = styleOf(index)
      const lines = breakIntoLines(pdf, texts[index] ?? '', style, share * pages.width - gutter)
      return { lines, x: edges[index] ?? 0, style }
    })
  const heightOf = (cells: readonly Cell[]) =>
    Math.max(...cells.map(({ lines, style }) => lines.length * style.leading)) + 2 * padding

  const drawCell = ({ lines, x, style }: Cell, place: Place, shift = 0) => {
    for (const [index, line] of lines.entries())
      drawLine(pdf, line, { x: place.x + x, top: place.top + shift + padding + index * style.leading }, style)
  }
  const ruleAt = (x: number, y: number, colour: string) =>
    pages.asDecoration(() => {
      pdf.moveTo(x, y).lineTo(x + pages.width, y)
      pdf.lineWidth(0.75).strokeColor(colour).stroke()
    })

  const head = cellsOf(
    columns.map(({ title }) => title),
    () => styles.cellStrong,
  )
  const headHeight = heightOf(head)
  const table = pdf.struct('Table')
  pages.root.add(table)

  const printRow = (cells: readonly Cell[], place: Place, shift: number, isHead: boolean) => {
    const row = pdf.struct('TR')
    table.add(row)
    for (const [index, cell] of cells.entries()) {
      const names = isHead || index === 0
      const element = pdf.struct(names ? 'TH' : 'TD', names ? scoped(isHead ? 'Column' : 'Row') : {}, () =>
        drawCell(cell, place, shift),
      )
      row.add(element)
    }
    row.end()
  }

  /** On a further page the headings are for the eye only: a reader aloud knows them from the first. */
  const repeatHead = (place: Place) => {
    pages.asDecoration(() => {
      for (const cell of head) drawCell(cell, place)
    })
    ruleAt(place.x, place.top + headHeight, colours.line)
  }

  const [first] = rows
  if (first) pages.keepTogether(headHeight + heightOf(cellsOf(first, () => styles.cell)))
  pages.place(headHeight, 4, (place) => {
    printRow(head, place, 0, true)
    ruleAt(place.x, place.top + headHeight, colours.line)
  })
  for (const texts of rows) {
    const whole = cellsOf(texts, (index) => (index === 0 ? styles.cellStrong : styles.cell))
    for (const cells of inParts(whole, pages.height - headHeight - 2 * padding)) {
      const height = heightOf(cells)
      const shift = pages.fits(height) ? 0 : headHeight
      pages.place(shift + height, 0, (place) => {
        if (shift > 0) repeatHead(place)
        printRow(cells, place, shift, false)
        ruleAt(place.x, place.top + shift + height, colours.lineSoft)
      })
    }
  }
  table.end()
}

/** A row higher than a page goes on as a further row, so that no line is lost. */
function inParts(cells: readonly Cell[], height: number): Cell[][] {
  const most = Math.floor(height / Math.max(...cells.map(({ style }) => style.leading)))
  const parts = Math.max(1, Math.ceil(Math.max(...cells.map(({ lines }) => lines.length)) / most))
  return Array.from({ length: parts }, (_, part) =>
    cells.map((cell) => ({ ...cell, lines: cell.lines.slice(part * most, (part + 1) * most) })),
  )
}
