import { resolve, type PdfDocument } from './pdfDocument.ts'
import { isDict, nameOf, PdfName, refusedFor, type PdfDict, type PdfValue } from './pdfValues.ts'

const script = 'carries a program'
const launch = 'can start another program or open another file'
const opening = 'acts by itself when it is opened'
const attached = 'carries another file'
const form = 'is a form that carries a program'
const media = 'carries sound, film or a three-dimensional model'
const sends = 'sends data elsewhere'

/** Keys of dictionaries that no page of handwriting needs (ISO 32000-1: 12.6, 7.11, 12.7.8, 13). */
const hazardousKeys = new Map<string, string>([
  ['JS', script],
  ['JavaScript', script],
  ['OpenAction', opening],
  ['AA', opening],
  ['XFA', form],
  ['EmbeddedFiles', attached],
  ['EF', attached],
  ['AF', attached],
  ['Collection', attached],
  ['RichMediaContent', media],
])

/** Names that as a value mean the same, wherever they stand: /S, /Type and /Subtype may be given through a reference. */
const hazardousNames = new Map<string, string>([
  ['JavaScript', script],
  ['Launch', launch],
  ['GoToR', launch],
  ['GoToE', launch],
  ['ImportData', launch],
  ['SubmitForm', sends],
  ['Rendition', media],
  ['RichMedia', media],
  ['RichMediaExecute', media],
  ['Movie', media],
  ['Sound', media],
  ['3D', media],
  ['EmbeddedFile', attached],
  ['FileAttachment', attached],
])

const hazardIn = (value: PdfValue): string | null => {
  if (value instanceof PdfName) return hazardousNames.get(value.text) ?? null
  if (Array.isArray(value)) return firstHazard(value)
  if (!isDict(value)) return null
  for (const key of value.keys()) {
    const hazard = hazardousKeys.get(key)
    if (hazard) return hazard
  }
  return firstHazard(value.values())
}

const firstHazard = (values: Iterable<PdfValue>): string | null => {
  for (const value of values) {
    const hazard = hazardIn(value)
    if (hazard) return hazard
  }
  return null
}

/** A stream may name a file of its own to be read in its place, or be a PostScript program for the printer. */
const hazardOfStream = (dict: PdfDict): string | null => {
  if (dict.has('F')) return attached
  return [dict.get('Subtype'), dict.get('Subtype2')].some((kind) => nameOf(kind) === 'PS') ? script : null
}

/** Refuses (422) a file with anything active or attached in any object, whether a page uses it or not. */
export const refuseHazards = ({ everything, trailers }: PdfDocument): void => {
  for (const { value, stream } of everything) {
    const hazard = (stream && isDict(value) && hazardOfStream(value)) || hazardIn(value)
    if (hazard) throw refusedFor(hazard)
  }
  const hazard = firstHazard(trailers)
  if (hazard) throw refusedFor(hazard)
}

/** Links lead nowhere in a stored sample and are left out; any other mark on a page would be lost with them. */
const leftOut = new Set(['Link', 'Popup'])

export const refuseMarks = (document: PdfDocument, page: PdfDict): void => {
  const marks = resolve(document, page.get('Annots'))
  for (const mark of Array.isArray(marks) ? marks : []) {
    const dict = resolve(document, mark)
    const kind = isDict(dict) ? nameOf(resolve(document, dict.get('Subtype'))) : null
    if (kind !== null && !leftOut.has(kind))
      throw refusedFor('has comments or form fields on its pages that would be lost')
  }
}
