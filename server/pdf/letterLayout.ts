import { printable, splitIntoRuns, type Run, type Weight } from './letterFonts.ts'

/** How a piece of text is set. Sizes and leading in points. */
export interface TextStyle {
  size: number
  weight: Weight
  leading: number
  colour: string
}

export type Line = Run[]

/** One structural element of the letter, broken into lines that fit the column. */
export interface Piece {
  tag: 'H1' | 'H2' | 'P' | 'LI'
  style: TextStyle
  lines: Line[]
  /** Space above, in points; left out at the top of a page. */
  before: number
  indent: number
}

export const heightOf = (piece: Piece) => piece.before + piece.lines.length * piece.style.leading

/** Width of runs set one after another, in points. */
export function widthOf(pdf: PDFKit.PDFDocument, line: Line, size: number): number {
  return line.reduce((width, run) => width + pdf.font(run.font, size).widthOfString(run.text), 0)
}

/**
 * Breaks one text into lines no wider than `width` points. Our own breaking, because a word may need two font files
 * ('Yavaş') and must not be broken between them. A word wider than the column is cut where it has to be.
 */
export function breakIntoLines(
  pdf: PDFKit.PDFDocument,
  text: string,
  style: TextStyle,
  width: number,
): Line[] {
  const runs = (part: string) => splitIntoRuns(pdf, part, style.weight)
  const measure = (part: string) => widthOf(pdf, runs(part), style.size)
  const space = measure(' ')
  const lines: string[] = []
  let line = ''
  let used = 0

  for (const word of printable(text).split(/ +/)) {
    const wordWidth = measure(word)
    if (line !== '' && used + space + wordWidth <= width) {
      line += ` ${word}`
      used += space + wordWidth
      continue
    }
    if (line !== '') lines.push(line)
    const pieces = wordWidth <= width ? [word] : cutWord(word, width, measure)
    lines.push(...pieces.slice(0, -1))
    line = pieces.at(-1) ?? ''
    used = measure(line)
  }
  lines.push(line)
  // The space at a line's end is kept, so that a reader aloud does not join two words.
  return lines.map((content, index) => runs(index < lines.length - 1 ? `${content} ` : content))
}

function cutWord(word: string, width: number, measure: (part: string) => number): string[] {
  const pieces = ['']
  for (const character of word) {
    const grown = (pieces.at(-1) ?? '') + character
    if (measure(grown) > width && grown.length > 1) pieces.push(character)
    else pieces[pieces.length - 1] = grown
  }
  return pieces
}

/** Sets one line with its top at `top`; nothing is broken or moved on. */
export function drawLine(
  pdf: PDFKit.PDFDocument,
  content: Line,
  { x, top }: { x: number; top: number },
  style: TextStyle,
): void {
  // The capital's height in the middle of the leading: lines of different sizes keep an even rhythm.
  const baseline = top + style.leading / 2 + style.size * 0.33
  let at = x
  for (const run of content) {
    pdf.font(run.font, style.size).fillColor(style.colour)
    pdf.text(run.text, at, baseline, { lineBreak: false, baseline: 'alphabetic' })
    at += widthOf(pdf, [run], style.size)
  }
}
