import { breakIntoLines, type Line, type Piece, type TextStyle } from './letterLayout.ts'
import type { Pages } from './letterPages.ts'

export const colours = {
  ink: '#1E2235',
  inkSoft: '#565B73',
  petal: '#4A3F8F',
  petalWash: '#E9E6F6',
  pollen: '#F4C64F',
  pollenWash: '#FCF1D3',
  line: '#8C8775',
  lineSoft: '#D9D5C8',
  sheet: '#FFFFFF',
} as const

/** Sizes and leading in points; nothing on the page is smaller than 9. */
export const styles = {
  clinic: { size: 15, weight: 600, leading: 19, colour: colours.petal },
  small: { size: 9.5, weight: 400, leading: 13, colour: colours.inkSoft },
  title: { size: 21, weight: 600, leading: 26, colour: colours.ink },
  heading: { size: 12.5, weight: 600, leading: 17, colour: colours.petal },
  body: { size: 11, weight: 400, leading: 16, colour: colours.ink },
  strong: { size: 11, weight: 600, leading: 16, colour: colours.ink },
  note: { size: 10, weight: 400, leading: 14, colour: colours.ink },
  cell: { size: 9.5, weight: 400, leading: 12.5, colour: colours.ink },
  cellStrong: { size: 9.5, weight: 600, leading: 12.5, colour: colours.ink },
} as const satisfies Record<string, TextStyle>

const listIndent = 15

/** One element of the page from its texts, each of which begins a line. */
export const pieceOf = (
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
