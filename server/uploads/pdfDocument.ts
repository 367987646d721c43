import { inflateSync } from 'node:zlib'
import { PdfSyntax } from './pdfSyntax.ts'
import { isDict, nameOf, PdfRef, refusedFor, uncheckable, type PdfDict, type PdfValue } from './pdfValues.ts'

export interface PdfObject {
  number: number
  value: PdfValue
  /** Bytes of a stream as stored, still under its filters. */
  stream: Buffer | null
}

export interface PdfDocument {
  /** The object that counts for each number: the last in the file. */
  objects: Map<number, PdfObject>
  /** Every object of the file, replaced and unreachable ones and those packed into object streams included. */
  everything: PdfObject[]
  trailers: PdfDict[]
}

const mostObjects = 50_000
const mostUnpacked = 32 * 1024 * 1024

/** The object a reference leads to; other values stand for themselves. */
export const resolve = ({ objects }: Pick<PdfDocument, 'objects'>, value: PdfValue | undefined): PdfValue => {
  let found: PdfValue = value ?? null
  for (let step = 0; found instanceof PdfRef; step += 1) {
    if (step > 20) throw uncheckable()
    found = objects.get(found.number)?.value ?? null
  }
  return found
}

interface FoundObject extends PdfObject {
  /** Where the stream begins, and where the first `endstream` after it was found. */
  span: { start: number; end: number } | null
}

/** Takes the bytes after `stream`: to the stated length when `endstream` stands there, else to the next `endstream`. */
const streamSpan = (syntax: PdfSyntax, stated: PdfValue | undefined) => {
  const { text } = syntax
  if (text.startsWith('\r\n', syntax.at)) syntax.at += 2
  else if ('\r\n'.includes(text.charAt(syntax.at))) syntax.at += 1
  else throw uncheckable()
  const start = syntax.at
  const known = typeof stated === 'number' && endsAt(text, start + stated)
  const end = known ? start + stated : text.indexOf('endstream', start)
  if (end < start) throw uncheckable()
  syntax.at = text.indexOf('endstream', end) + 'endstream'.length
  return { start, end }
}

const endsAt = (text: string, at: number): boolean =>
  Number.isInteger(at) && /^[\r\n ]{0,2}endstream/.test(text.slice(at, at + 11))

const readObject = (syntax: PdfSyntax, number: number): FoundObject => {
  const value = syntax.value()
  syntax.skipSpace()
  let span: FoundObject['span'] = null
  if (syntax.takeWord('stream')) {
    if (!isDict(value)) throw uncheckable()
    span = streamSpan(syntax, value.get('Length'))
    syntax.skipSpace()
  }
  if (!syntax.takeWord('endobj')) throw uncheckable()
  return { number, value, stream: null, span }
}

const skipCrossReferences = (syntax: PdfSyntax) => {
  for (;;) {
    syntax.skipSpace()
    if (syntax.takeInteger() === null && !syntax.takeWord('n') && !syntax.takeWord('f')) return
  }
}

/** Reads the whole file from its first byte to its last; anything between objects that is not PDF is refused. */
const readFile = (text: string): { found: FoundObject[]; trailers: PdfDict[] } => {
  const syntax = new PdfSyntax(text)
  const found: FoundObject[] = []
  const trailers: PdfDict[] = []
  for (;;) {
    syntax.skipSpace()
    if (syntax.at >= text.length) return { found, trailers }
    if (syntax.takeWord('xref')) skipCrossReferences(syntax)
    else if (syntax.takeWord('startxref')) syntax.takeInteger()
    else if (syntax.takeWord('trailer')) {
      const trailer = syntax.value()
      if (!isDict(trailer)) throw uncheckable()
      trailers.push(trailer)
    } else {
      const number = syntax.takeInteger()
      const generation = syntax.takeInteger()
      syntax.skipSpace()
      if (number === null || generation === null || !syntax.takeWord('obj')) throw uncheckable()
      found.push(readObject(syntax, number))
      if (found.length > mostObjects) throw uncheckable()
    }
  }
}

const names = (value: PdfValue): (string | null)[] => (Array.isArray(value) ? value : [value]).map(nameOf)

/** Undoes the one filter that object streams use; others could hide what they hold, so they are refused. */
const unpack = (objects: PdfDocument, dict: PdfDict, stream: Buffer, room: number): Buffer => {
  const filter = resolve(objects, dict.get('Filter'))
  if (filter === null) return stream
  const parameters = resolve(objects, dict.get('DecodeParms'))
  if (names(filter).join() !== 'FlateDecode' || parameters !== null) throw uncheckable()
  try {
    return inflateSync(stream, { maxOutputLength: Math.max(1, room) })
  } catch {
    // Broken or larger than we are ready to look at: both mean that nobody can say what is inside.
    throw uncheckable()
  }
}

/** Some readers go by /N and /First alone, so /Type is not waited for. */
const isObjectStream = (dict: PdfDict) =>
  nameOf(dict.get('Type')) === 'ObjStm' || (dict.has('N') && dict.has('First'))

const packedObjects = (document: PdfDocument, dict: PdfDict, unpacked: Buffer): PdfObject[] => {
  const text = unpacked.toString('latin1')
  const count = resolve(document, dict.get('N'))
  const first = resolve(document, dict.get('First'))
  if (typeof count !== 'number' || typeof first !== 'number' || count > mostObjects) throw uncheckable()
  const head = new PdfSyntax(text)
  const packed: PdfObject[] = []
  let read = 0
  for (let index = 0; index < count; index += 1) {
    const number = head.takeInteger()
    const offset = head.takeInteger()
    if (number === null || offset === null) throw uncheckable()
    const body = new PdfSyntax(text, first + offset)
    packed.push({ number, value: body.value(), stream: null })
    // Objects that share their text would be read again and again without end.
    read += body.at - (first + offset)
    if (read > text.length) throw uncheckable()
  }
  return packed
}

const cutStreams = (document: PdfDocument, found: FoundObject[], bytes: Buffer, text: string) => {
  for (const object of found) {
    if (!object.span || !isDict(object.value)) continue
    const { start, end } = object.span
    const stated = resolve(document, object.value.get('Length'))
    const exact = typeof stated === 'number' && start + stated <= end && endsAt(text, start + stated)
    object.stream = bytes.subarray(start, exact ? start + stated : end)
  }
}

/**
 * Reads every object of a PDF file. The cross-reference tables are not trusted: what counts is what stands in the file.
 * Throws 422 for files that are damaged, protected by a password, or too unusual to be sure of.
 */
export const readPdf = (bytes: Buffer): PdfDocument => {
  const text = bytes.toString('latin1')
  if (!/^%PDF-[12]\.\d/.test(text)) throw uncheckable()
  const { found, trailers } = readFile(text)
  const document: PdfDocument = {
    objects: new Map(found.map((object) => [object.number, object])),
    everything: [],
    trailers,
  }
  const dicts = [...trailers, ...found.map((object) => object.value).filter(isDict)]
  if (dicts.some((dict) => dict.has('Encrypt'))) throw refusedFor('is protected by a password')
  cutStreams(document, found, bytes, text)

  const counting = new Map<number, PdfObject>()
  let room = mostUnpacked
  for (const object of found) {
    const { value, stream } = object
    document.everything.push(object)
    counting.set(object.number, object)
    if (!isDict(value) || !stream) continue
    if (nameOf(value.get('Type')) === 'XRef') trailers.push(value)
    if (!isObjectStream(value)) continue
    const unpacked = unpack(document, value, stream, room)
    room -= unpacked.length
    for (const packed of packedObjects(document, value, unpacked)) {
      document.everything.push(packed)
      counting.set(packed.number, packed)
    }
    if (document.everything.length > mostObjects) throw uncheckable()
  }
  document.objects = counting
  return document
}
