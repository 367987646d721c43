import { PdfName, PdfRef, PdfString, uncheckable, type PdfDict, type PdfValue } from './pdfValues.ts'

const deepest = 60

const isSpace = (code: number) =>
  code === 32 || code === 10 || code === 13 || code === 9 || code === 0 || code === 12

/** White space and brackets end a word; everything else is part of it. */
const endsWord = new Set([...'\0\t\n\f\r ()<>[]{}/%'].map((sign) => sign.charCodeAt(0)))
const numeral = /^[+-]?(?:\d+\.?\d*|\.\d+)$/

/** Reads PDF syntax (ISO 32000-1, 7.2 and 7.3) from one text, strictly: what is not understood is refused. */
export class PdfSyntax {
  readonly text: string
  at: number

  constructor(text: string, at = 0) {
    this.text = text
    this.at = at
  }

  /** Moves over white space and comments. */
  skipSpace(): void {
    const { text } = this
    for (;;) {
      const code = text.charCodeAt(this.at)
      if (isSpace(code)) this.at += 1
      else if (code === 37)
        while (this.at < text.length && !'\r\n'.includes(text.charAt(this.at))) this.at += 1
      else return
    }
  }

  /** Takes this word if it comes next and ends there. */
  takeWord(word: string): boolean {
    if (!this.text.startsWith(word, this.at)) return false
    const end = this.at + word.length
    if (end < this.text.length && !endsWord.has(this.text.charCodeAt(end))) return false
    this.at = end
    return true
  }

  private word(): string {
    const start = this.at
    while (this.at < this.text.length && !endsWord.has(this.text.charCodeAt(this.at))) this.at += 1
    return this.text.slice(start, this.at)
  }

  /** A whole number without sign, or null (and nothing taken). */
  takeInteger(): number | null {
    this.skipSpace()
    const start = this.at
    const found = this.word()
    if (/^\d{1,10}$/.test(found)) return Number(found)
    this.at = start
    return null
  }

  value(depth = 0): PdfValue {
    if (depth > deepest) throw uncheckable()
    this.skipSpace()
    const sign = this.text.charAt(this.at)
    if (sign === '/') return this.name()
    if (sign === '(') return this.literal()
    if (sign === '[') return this.array(depth)
    if (sign === '<') return this.text.charAt(this.at + 1) === '<' ? this.dict(depth) : this.hexadecimal()
    const found = this.word()
    if (numeral.test(found)) return this.numberOrRef(found)
    if (found === 'true') return true
    if (found === 'false') return false
    if (found === 'null') return null
    throw uncheckable()
  }

  private numberOrRef(found: string): number | PdfRef {
    const number = Number(found)
    const after = this.at
    if (/^\d{1,10}$/.test(found) && this.takeInteger() !== null) {
      this.skipSpace()
      if (this.takeWord('R')) return new PdfRef(number)
    }
    this.at = after
    return number
  }

  private name(): PdfName {
    this.at += 1
    const raw = this.word()
    return new PdfName(
      raw.replace(/#([0-9a-fA-F]{2})/g, (_, code: string) => String.fromCharCode(Number.parseInt(code, 16))),
    )
  }

  private literal(): PdfString {
    const start = this.at
    let open = 0
    for (; this.at < this.text.length; this.at += 1) {
      const sign = this.text.charAt(this.at)
      if (sign === '\\') this.at += 1
      else if (sign === '(') open += 1
      else if (sign === ')') {
        open -= 1
        if (open === 0) {
          this.at += 1
          return new PdfString(this.text.slice(start, this.at))
        }
      }
    }
    throw uncheckable()
  }

  private hexadecimal(): PdfString {
    const end = this.text.indexOf('>', this.at)
    const raw = this.text.slice(this.at, end + 1)
    if (end < 0 || !/^<[0-9a-fA-F\s\0]*>$/.test(raw)) throw uncheckable()
    this.at = end + 1
    return new PdfString(raw)
  }

  private array(depth: number): PdfValue[] {
    this.at += 1
    const values: PdfValue[] = []
    for (;;) {
      this.skipSpace()
      if (this.text.charAt(this.at) === ']') {
        this.at += 1
        return values
      }
      values.push(this.value(depth + 1))
    }
  }

  private dict(depth: number): PdfDict {
    this.at += 2
    const entries: PdfDict = new Map()
    for (;;) {
      this.skipSpace()
      if (this.text.startsWith('>>', this.at)) {
        this.at += 2
        return entries
      }
      if (this.text.charAt(this.at) !== '/') throw uncheckable()
      const key = this.name().text
      entries.set(key, this.value(depth + 1))
    }
  }
}
