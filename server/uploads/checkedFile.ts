import { createHash } from 'node:crypto'
import { fileTypeFromBuffer } from 'file-type'
import { maximumImageBytes, maximumPdfBytes, type SampleType } from '../../shared/samples.ts'
import { AppError, invalid } from '../errors.ts'
import { createLine } from '../inLine.ts'
import { readImage } from './imageFile.ts'
import { readPdfFile } from './pdfFile.ts'
import type { ReceivedFile } from './receiveUpload.ts'

/** What is stored of an upload: our own re-encoding, and the hash of what was sent. */
export interface CheckedFile {
  contentType: SampleType
  content: Buffer
  /** JPEG; null for a PDF, which is never drawn on the server. */
  thumbnail: Buffer | null
  width: number | null
  height: number | null
  pixelsPerMm: number | null
  sha256: Buffer
  originalSha256: Buffer
}

/** The driver sends bytes as hexadecimal text, and a packet to the database holds 30 MB at least. */
const maximumStoredBytes = 12 * 1024 * 1024

const typeOfEnding: Record<string, SampleType> = {
  jpg: 'image/jpeg',
  jpeg: 'image/jpeg',
  png: 'image/png',
  webp: 'image/webp',
  pdf: 'application/pdf',
}

const accepted = 'Pictures can be JPEG, PNG or WebP; scans can be PDF.'
const advice: Record<string, string> = {
  heic: 'HEIC pictures cannot be kept. On the phone choose the most compatible camera format, or send it as JPEG.',
  heif: 'HEIF pictures cannot be kept. On the phone choose the most compatible camera format, or send it as JPEG.',
  gif: `GIF pictures cannot be kept. ${accepted}`,
  svg: `SVG drawings cannot be kept, for they can carry programs. ${accepted}`,
  zip: `Take the picture out of the ZIP file first. ${accepted}`,
}

const sha256 = (bytes: Buffer) => createHash('sha256').update(bytes).digest()

const wrongType = (message: string) => new AppError(415, 'wrong_type', message, { fields: { file: message } })

const tooLarge = (message: string) => new AppError(413, 'too_large', message, { fields: { file: message } })

/** The type on which the name, the sender's word and the first bytes agree; refused otherwise. */
const agreedType = async ({ originalname, mimetype, buffer }: ReceivedFile): Promise<SampleType> => {
  const ending = /\.([^.]+)$/.exec(originalname)?.[1]?.toLowerCase() ?? ''
  const type = typeOfEnding[ending]
  if (!type) throw wrongType(advice[ending] ?? `This kind of file cannot be kept. ${accepted}`)
  const begins = await fileTypeFromBuffer(buffer)
  if (mimetype !== type || begins?.mime !== type)
    throw wrongType(`The name ends in .${ending}, but the content is something else. ${accepted}`)
  return type
}

/** Opening a picture takes memory and a processor for a moment. */
const openInTurn = createLine({ atOnce: 1, mostWaiting: 7, retryAfterSeconds: 5 })

/**
 * Opens an upload and makes what is stored of it. The file's ending, declared type, first bytes and full decoding must
 * agree. Throws 413, 415 or 422 with a message beside the field `file`; 503 when too many
 * wait to be opened.
 */
export const checkFile = async (file: ReceivedFile): Promise<CheckedFile> => {
  if (file.buffer.length === 0) throw invalid({ file: 'This file is empty. Choose it again.' })
  const contentType = await agreedType(file)
  const isPdf = contentType === 'application/pdf'
  if (file.buffer.length > (isPdf ? maximumPdfBytes : maximumImageBytes))
    throw tooLarge('This file is too large: 8 MB for pictures, 10 MB for PDF at most.')
  const opened = await openInTurn(async () =>
    isPdf
      ? { content: readPdfFile(file.buffer), thumbnail: null, width: null, height: null, pixelsPerMm: null }
      : readImage(file.buffer, contentType),
  )
  if (opened.content.length > maximumStoredBytes)
    throw tooLarge(
      'Opened, this file is too large to keep. Scan at 300 dots per inch, or photograph the page.',
    )
  return { contentType, ...opened, sha256: sha256(opened.content), originalSha256: sha256(file.buffer) }
}
