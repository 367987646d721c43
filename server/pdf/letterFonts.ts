import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import PDFDocument from 'pdfkit'

export type Weight = 400 | 600

/** A stretch of text that one font file can print. */
export interface Run {
  font: string
  text: string
}

/** A text holds characters that no font here can draw. Printing a box in a name would be worse than refusing. */
export class UnprintableTextError extends Error {
  readonly characters: string[]

  constructor(characters: string[]) {
    super(`There are characters that cannot be printed: ${characters.join(' ')}`)
    this.name = 'UnprintableTextError'
    this.characters = characters
  }
}

// Each file of the package holds one part of Unicode. Latin comes first, so that a name stays in one file if it can.
const subsets = [
  'latin',
  'latin-ext',
  'vietnamese',
  'greek',
  'greek-ext',
  'cyrillic',
  'cyrillic-ext',
] as const

const files = createRequire(import.meta.url)
const loaded = new Map<string, Buffer>()

function fontFile(subset: string, weight: Weight): Buffer {
  const name = `source-sans-3-${subset}-${weight}-normal.woff`
  const known = loaded.get(name)
  if (known) return known
  const content = readFileSync(files.resolve(`@fontsource/source-sans-3/files/${name}`))
  loaded.set(name, content)
  return content
}

interface OpenFont {
  _font: { font: { hasGlyphForCodePoint: (codePoint: number) => boolean } }
}

const fontName = (subset: string, weight: Weight) => `source-sans-3-${subset}-${weight}`

/** Puts every part of Source Sans 3 at the document's disposal; only those used are embedded. */
export function registerFonts(pdf: PDFKit.PDFDocument) {
  for (const weight of [400, 600] as const)
    for (const subset of subsets) pdf.registerFont(fontName(subset, weight), fontFile(subset, weight))
}

function canDraw(pdf: PDFKit.PDFDocument, font: string, character: string) {
  pdf.font(font)
  // pdfkit does not publish the opened font, and a character it has no glyph for is drawn as a box without a word.
  const { font: opened } = (pdf as unknown as OpenFont)._font
  return [...character].every((part) => opened.hasGlyphForCodePoint(part.codePointAt(0) ?? 0))
}

const graphemes = new Intl.Segmenter('en', { granularity: 'grapheme' })

/** Soft hyphens and tabs have no place in print; accents are joined to their letters so that one glyph is found. */
export const printable = (text: string) =>
  text.normalize('NFC').replaceAll('\u00ad', '').replaceAll('\t', ' ')

const fontFor = (pdf: PDFKit.PDFDocument, character: string, weight: Weight) =>
  subsets.map((subset) => fontName(subset, weight)).find((font) => canDraw(pdf, font, character))

const unknownTo = (pdf: PDFKit.PDFDocument, texts: readonly string[]): string[] => {
  const characters = new Set(
    texts.flatMap((text) =>
      [...graphemes.segment(printable(text).replace(/\s/g, ' '))].map((part) => part.segment),
    ),
  )
  return [...characters].filter((character) => fontFor(pdf, character, 400) === undefined)
}

/** Refuses texts with characters that no font file has, naming each of them once. */
export function assertPrintable(pdf: PDFKit.PDFDocument, texts: readonly string[]) {
  const unknown = unknownTo(pdf, texts)
  if (unknown.length > 0) throw new UnprintableTextError(unknown)
}

/** The characters of these texts that cannot be printed, each once; empty when all can. Nothing is laid out. */
export function unprintableIn(texts: readonly string[]): string[] {
  const pdf = new PDFDocument({ autoFirstPage: false })
  registerFonts(pdf)
  return unknownTo(pdf, texts)
}

/** Splits text into runs by the font file that has its characters. A letter and its combining accents stay together. */
export function splitIntoRuns(pdf: PDFKit.PDFDocument, text: string, weight: Weight): Run[] {
  const runs: Run[] = []
  for (const { segment: character } of graphemes.segment(text)) {
    const font = fontFor(pdf, character, weight)
    if (font === undefined) throw new UnprintableTextError([character])
    const last = runs.at(-1)
    if (last?.font === font) last.text += character
    else runs.push({ font, text: character })
  }
  return runs
}
