import { invalid, type AppError } from '../errors.ts'

/** What a PDF file is made of (ISO 32000-1, 7.3). Text is latin1: one character stands for one byte. */
export type PdfValue = null | boolean | number | PdfName | PdfString | PdfRef | PdfValue[] | PdfDict
export type PdfDict = Map<string, PdfValue>

/** A name with its #xx escapes undone, so that /J#53 is the same as /JS. */
export class PdfName {
  readonly text: string

  constructor(text: string) {
    this.text = text
  }
}

/** A string as written, brackets and escapes included. */
export class PdfString {
  readonly raw: string

  constructor(raw: string) {
    this.raw = raw
  }
}

/** Points to an object by number. Generations are ignored: the last object of a number counts. */
export class PdfRef {
  readonly number: number

  constructor(number: number) {
    this.number = number
  }
}

export const isDict = (value: PdfValue | undefined): value is PdfDict => value instanceof Map

export const nameOf = (value: PdfValue | undefined): string | null =>
  value instanceof PdfName ? value.text : null

const wayOut = 'Print it to PDF once more, or photograph the page.'

export const uncheckable = (): AppError =>
  invalid({ file: `This PDF cannot be checked: it is damaged or built in an unusual way. ${wayOut}` })

export const refusedFor = (what: string): AppError =>
  invalid({ file: `This PDF ${what}, so it cannot be kept. ${wayOut}` })
