import { withoutJpegMetadata } from './jpegSegments.ts'
import { resolve, type PdfDocument } from './pdfDocument.ts'
import { refuseMarks } from './pdfHazards.ts'
import {
  isDict,
  nameOf,
  PdfName,
  PdfRef,
  PdfString,
  refusedFor,
  uncheckable,
  type PdfDict,
  type PdfValue,
} from './pdfValues.ts'

export const mostPages = 30
const deepestTree = 40
const mostTreeNodes = 500
/** One page's own entries; drawings live in streams of their own, so this is far more than any page needs. */
const longestPage = 500_000

/** What a page keeps; everything else of it (links, thumbnails, marks of programs, dates) is left behind. */
const pageKeys = ['CropBox', 'BleedBox', 'TrimBox', 'ArtBox', 'Contents', 'Group', 'UserUnit']
/** What a page may take from the tree above it. */
const inherited = ['Resources', 'MediaBox', 'CropBox', 'Rotate']

/** Never copied from any dictionary: descriptions, private data of programs, and ways back to the page tree. */
const leftBehind = new Set([
  ...['Metadata', 'PieceInfo', 'LastModified', 'Parent', 'StructParent', 'StructParents', 'Thumb', 'Annots'],
  ...['Names', 'Dests', 'OPI', 'Ref', 'Info', 'AA', 'AF', 'OpenAction', 'JS'],
])
const treeTypes = new Set(['Catalog', 'Pages', 'Page'])

/** The pages in order, each with what it inherits. Throws 422 when there are none or too many. */
export const listPages = (document: PdfDocument): { root: PdfDict; pages: PdfDict[] } => {
  const root = resolve(document, document.trailers.findLast((trailer) => trailer.has('Root'))?.get('Root'))
  if (!isDict(root)) throw uncheckable()
  const pages: PdfDict[] = []
  let nodes = 0
  const walk = (value: PdfValue | undefined, above: PdfDict, depth: number) => {
    const node = resolve(document, value)
    nodes += 1
    if (!isDict(node) || depth > deepestTree || nodes > mostTreeNodes) throw uncheckable()
    const taken = new Map([
      ...above,
      ...inherited.flatMap((key) => (node.has(key) ? [[key, node.get(key) ?? null] as const] : [])),
    ])
    const kids = resolve(document, node.get('Kids'))
    if (Array.isArray(kids)) {
      for (const kid of kids) walk(kid, taken, depth + 1)
      return
    }
    pages.push(new Map([...node, ...taken]))
    if (pages.length > mostPages) throw refusedFor(`has more than ${mostPages} pages`)
  }
  walk(root.get('Pages'), new Map(), 0)
  if (pages.length === 0) throw uncheckable()
  return { root, pages }
}

const writeNumber = (value: number) =>
  Number.isInteger(value) ? String(value) : value.toFixed(8).replace(/\.?0+$/, '')

const writeName = (name: string) =>
  `/${name.replace(/[^!-~]|[#()<>[\]{}/%]/g, (sign) => `#${sign.charCodeAt(0).toString(16).padStart(2, '0')}`)}`

/** Copies what the pages use into a new file; nothing else of the old one comes along. */
class PdfCopy {
  private readonly document: PdfDocument
  private readonly numbers = new Map<number, number>()
  private readonly queue: number[] = []
  private next: number

  constructor(document: PdfDocument, firstFree: number) {
    this.document = document
    this.next = firstFree
  }

  /** A value in PDF syntax; objects it points to are queued to be copied. */
  write(value: PdfValue): string {
    if (value === null || typeof value === 'boolean') return String(value)
    if (typeof value === 'number') return writeNumber(value)
    if (value instanceof PdfName) return writeName(value.text)
    if (value instanceof PdfString) return value.raw
    if (value instanceof PdfRef) return this.refer(value.number)
    if (Array.isArray(value)) return `[${value.map((part) => this.write(part)).join(' ')}]`
    return this.writeDict(value)
  }

  private writeDict(dict: PdfDict): string {
    const kept = [...dict].filter(([key]) => !leftBehind.has(key))
    return `<<${kept.map(([key, value]) => `${writeName(key)} ${this.write(value)}`).join('\n')}>>`
  }

  private refer(number: number): string {
    const target = this.document.objects.get(number)
    const type = target && isDict(target.value) ? nameOf(target.value.get('Type')) : null
    if (!target || (type !== null && treeTypes.has(type))) return 'null'
    let copied = this.numbers.get(number)
    if (copied === undefined) {
      copied = this.next
      this.next += 1
      this.numbers.set(number, copied)
      this.queue.push(number)
    }
    return `${copied} 0 R`
  }

  /** The queued objects, and those found while copying them, numbered in order. */
  *copies(): Generator<Buffer> {
    for (let number = this.queue.shift(); number !== undefined; number = this.queue.shift()) {
      const object = this.document.objects.get(number)
      if (!object) throw uncheckable()
      if (!object.stream || !isDict(object.value)) yield Buffer.from(this.write(object.value), 'latin1')
      else yield this.copyStream(object.value, object.stream)
    }
  }

  private copyStream(dict: PdfDict, stream: Buffer): Buffer {
    const filter = resolve(this.document, dict.get('Filter'))
    const filters = (Array.isArray(filter) ? filter : [filter]).map(nameOf)
    const data = filters.join() === 'DCTDecode' ? withoutJpegMetadata(stream) : stream
    const head = this.write(new Map([...dict, ['Length', data.length]]))
    return Buffer.concat([
      Buffer.from(`${head}\nstream\n`, 'latin1'),
      data,
      Buffer.from('\nendstream', 'latin1'),
    ])
  }
}

const file = (bodies: Buffer[]): Buffer => {
  const parts: Buffer[] = []
  let length = 0
  const put = (part: Buffer | string) => {
    const bytes = typeof part === 'string' ? Buffer.from(part, 'latin1') : part
    parts.push(bytes)
    length += bytes.length
  }
  // The four high bytes tell programs that the file is not plain text (ISO 32000-1, 7.5.2).
  put('%PDF-1.7\n%\xe2\xe3\xcf\xd3\n')
  const offsets = bodies.map((body, index) => {
    const offset = length
    put(`${index + 1} 0 obj\n`)
    put(body)
    put('\nendobj\n')
    return offset
  })
  const start = length
  const lines = offsets.map((offset) => `${String(offset).padStart(10, '0')} 00000 n \n`).join('')
  put(`xref\n0 ${bodies.length + 1}\n0000000000 65535 f \n${lines}`)
  put(`trailer\n<</Size ${bodies.length + 1} /Root 1 0 R>>\nstartxref\n${start}\n%%EOF\n`)
  return Buffer.concat(parts)
}

/** A new file with the pages of the old one and what they draw with. Throws 422 when a page would lose something. */
export const rewritePdf = (document: PdfDocument): Buffer => {
  const { root, pages } = listPages(document)
  for (const page of pages) refuseMarks(document, page)
  const firstPage = 3
  const copy = new PdfCopy(document, firstPage + pages.length)
  const layers = root.get('OCProperties')
  const bodies = [
    `<</Type /Catalog /Pages 2 0 R${layers === undefined ? '' : ` /OCProperties ${copy.write(layers)}`}>>`,
    `<</Type /Pages /Count ${pages.length} /Kids [${pages.map((_, index) => `${firstPage + index} 0 R`).join(' ')}]>>`,
    ...pages.map((page) => {
      const kept = [...new Set([...inherited, ...pageKeys])].flatMap((key) =>
        page.has(key) ? [`${writeName(key)} ${copy.write(page.get(key) ?? null)}`] : [],
      )
      const body = kept.join('\n')
      if (body.length > longestPage) throw uncheckable()
      return `<</Type /Page /Parent 2 0 R\n${body}>>`
    }),
  ].map((body) => Buffer.from(body, 'latin1'))
  return file([...bodies, ...copy.copies()])
}
