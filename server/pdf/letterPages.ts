import { splitIntoRuns } from './letterFonts.ts'
import { drawLine, heightOf, type Line, type Piece, type TextStyle } from './letterLayout.ts'

/** A4 in points. The wide margin is on one side, on purpose: it carries the ornament and leaves room for a hand. */
const page = { width: 595.28, height: 841.89, left: 98, right: 62, top: 58, bottom: 66 }
const floor = page.height - page.bottom
/** A list up to this height, in points, stays on one page with the line that opens it. */
const shortList = 110
const panel = { padding: 11, radius: 14 }

const petal = '#4A3F8F'
const petalWash = '#E9E6F6'
const pollen = '#F4C64F'
const line = '#8C8775'
const footer: TextStyle = { size: 9, weight: 400, leading: 12, colour: '#565B73' }

/** Where something is drawn, in points from the top left corner of the page. */
export interface Place {
  x: number
  top: number
}

export interface Pages {
  /** Height of the text column, in points. */
  height: number
  /** Width of the text column, in points. */
  width: number
  print: (pieces: Piece[]) => void
  /** Prints a section on a tinted panel when it fits on one page, plainly when it does not. */
  printOnPanel: (pieces: Piece[]) => void
  /** Does something of this height still go on the page? At its top, always. */
  fits: (height: number) => boolean
  keepTogether: (height: number) => void
  /** Gives `draw` a place of this height, on the next page when it does not fit here; `gap` is left above it. */
  place: (height: number, gap: number, draw: (place: Place) => void) => void
  /** Draws what is not read aloud. */
  asDecoration: (draw: () => void) => void
  /** Element of the whole document, for what is tagged outside of here. */
  root: PDFKit.PDFStructureElement
  ornament: () => void
  rule: () => void
  finish: (text: (page: number, count: number) => string) => void
}

/** Fills A4 pages from top to bottom and tags what it prints. Decoration is marked as such and not read aloud. */
export function createPages(pdf: PDFKit.PDFDocument): Pages {
  const width = page.width - page.left - page.right
  const root = pdf.struct('Document')
  pdf.addStructure(root)
  pdf.addPage()
  let y = page.top
  let atTop = true

  const asDecoration = (draw: () => void) => {
    pdf.markContent('Artifact', { type: 'Layout' })
    pdf.save()
    draw()
    pdf.restore()
    pdf.endMarkedContent()
  }

  const newPage = () => {
    pdf.addPage()
    y = page.top
    atTop = true
  }

  /** Continues on a new page inside the element that is being printed. */
  const continuePage = () => {
    pdf.continueOnNewPage()
    y = page.top
    atTop = true
  }

  const fits = (height: number) => atTop || y + height <= floor

  const keepTogether = (height: number) => {
    if (!fits(height)) newPage()
  }

  const printLine = (content: Line, x: number, style: TextStyle) => {
    drawLine(pdf, content, { x, top: y }, style)
    y += style.leading
    atTop = false
  }

  const place: Pages['place'] = (height, gap, draw) => {
    keepTogether(gap + height)
    if (!atTop) y += gap
    draw({ x: page.left, top: y })
    y += height
    atTop = false
  }

  /** How many lines go on this page: never one alone at its foot, never one alone on the next. */
  const linesThatFit = (left: number, leading: number) => {
    const room = Math.floor((floor - y + 0.01) / leading)
    if (room >= left) return left
    const kept = left - room === 1 ? room - 1 : room
    return kept < 2 && !atTop ? 0 : Math.max(kept, 1)
  }

  const printLines = (piece: Piece) => {
    let done = 0
    while (done < piece.lines.length) {
      const count = linesThatFit(piece.lines.length - done, piece.style.leading)
      if (count === 0) {
        continuePage()
        continue
      }
      for (const content of piece.lines.slice(done, done + count))
        printLine(content, page.left + piece.indent, piece.style)
      done += count
    }
  }

  /** The least that begins a piece, as `linesThatFit` breaks it: three lines stay together, more begin with two. */
  const startOf = ({ before, lines, style }: Piece) =>
    before + (lines.length > 3 ? 2 : lines.length) * style.leading

  /** What must not be torn from the piece at `index`: a heading's text, an opening line's list when it is short. */
  const heldTogether = (pieces: Piece[], index: number): number => {
    const piece = pieces[index]
    const following = pieces[index + 1]
    if (!piece) return 0
    if (piece.tag === 'H1' || piece.tag === 'H2') return heightOf(piece) + heldTogether(pieces, index + 1)
    if (piece.tag !== 'P' || following?.tag !== 'LI') return startOf(piece)
    const end = pieces.findIndex((other, at) => at > index && other.tag !== 'LI')
    const items = pieces.slice(index + 1, end === -1 ? undefined : end)
    const list = items.reduce((height, item) => height + heightOf(item), 0)
    return heightOf(piece) + (list <= shortList ? list : startOf(following))
  }

  const printItem = (list: PDFKit.PDFStructureElement, piece: Piece) => {
    const item = pdf.struct('LI')
    list.add(item)
    const top = y
    item.add(
      pdf.struct('Lbl', {}, () => {
        printLine(splitIntoRuns(pdf, '•', 600), page.left + 2, { ...piece.style, weight: 600, colour: petal })
        y = top
      }),
    )
    item.add(pdf.struct('LBody', {}, () => printLines(piece)))
    item.end()
  }

  const print = (pieces: Piece[]) => {
    let list: PDFKit.PDFStructureElement | null = null
    for (const [index, piece] of pieces.entries()) {
      keepTogether(heldTogether(pieces, index))
      if (!atTop) y += piece.before
      if (piece.tag !== 'LI') {
        list?.end()
        list = null
        root.add(pdf.struct(piece.tag, {}, () => printLines(piece)))
        continue
      }
      if (list === null) {
        list = pdf.struct('L')
        root.add(list)
      }
      printItem(list, piece)
    }
    list?.end()
  }

  const printOnPanel = (pieces: Piece[]) => {
    const [first] = pieces
    if (!first) return
    const inner = pieces.reduce((sum, piece) => sum + heightOf(piece), 0) - first.before
    const height = inner + 2 * panel.padding
    if (height > floor - page.top) {
      print(pieces)
      return
    }
    keepTogether(first.before + height)
    if (!atTop) y += first.before
    asDecoration(() => {
      const [left, right] = [page.left - panel.padding, page.left + width + panel.padding]
      const [top, bottom, radius] = [y, y + height, panel.radius]
      // Square on one side, round on the other.
      pdf
        .moveTo(left, top)
        .lineTo(right - radius, top)
        .quadraticCurveTo(right, top, right, top + radius)
      pdf
        .lineTo(right, bottom - radius)
        .quadraticCurveTo(right, bottom, right - radius, bottom)
        .lineTo(left, bottom)
      pdf.closePath().fill(petalWash)
      pdf.rect(left, top, 3, height).fill(petal)
    })
    y += panel.padding
    print(pieces.map((piece, index) => (index === 0 ? { ...piece, before: 0 } : piece)))
    y += panel.padding
  }

  /** Five petals on one side, beside the clinic's name. */
  const ornament = () =>
    asDecoration(() => {
      pdf.translate(page.left - 22, page.top + 12)
      for (const [index, angle] of [120, 150, 180, 210, 240].entries()) {
        pdf.save()
        pdf.rotate(angle)
        pdf.moveTo(4, 0).bezierCurveTo(9, -7, 22, -6, 25, 0).bezierCurveTo(22, 6, 9, 7, 4, 0)
        pdf.fill(index % 2 === 0 ? petal : '#8F86C4')
        pdf.restore()
      }
      pdf.circle(0, 0, 4).fill(pollen)
    })

  const rule = () =>
    asDecoration(() => {
      y += 10
      pdf.moveTo(page.left, y).lineTo(page.left + width, y)
      pdf.lineWidth(0.75).strokeColor(line).stroke()
    })

  const finish = (text: (page: number, count: number) => string) => {
    root.end()
    const { count } = pdf.bufferedPageRange()
    for (let index = 0; index < count; index += 1) {
      pdf.switchToPage(index)
      pdf.markContent('Artifact', { type: 'Pagination' })
      y = page.height - 44
      printLine(splitIntoRuns(pdf, text(index + 1, count), footer.weight), page.left, footer)
      pdf.endMarkedContent()
    }
  }

  const height = floor - page.top
  return {
    width,
    height,
    root,
    fits,
    keepTogether,
    place,
    asDecoration,
    print,
    printOnPanel,
    ornament,
    rule,
    finish,
  }
}
