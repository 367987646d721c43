import sharp, { type Metadata, type Sharp } from 'sharp'
import { pixelsPerMmOf } from '../../shared/scanDensity.ts'
import type { SampleType } from '../../shared/samples.ts'
import { AppError, invalid } from '../errors.ts'

/** 40 million: more than an A4 page at 600 dots per inch. */
const maximumPixels = 40_000_000
const patienceSeconds = 5
const thumbnailEdge = 480

// Uploads are opened one at a time; caches between them would only keep memory and children's work.
sharp.cache(false)
sharp.concurrency(1)

const open = (bytes: Buffer): Sharp =>
  sharp(bytes, { limitInputPixels: maximumPixels, failOn: 'error', sequentialRead: true })

const formatOf: Partial<Record<SampleType, Metadata['format']>> = {
  'image/jpeg': 'jpeg',
  'image/png': 'png',
  'image/webp': 'webp',
}

const tooManyPixels =
  'This picture has more than 40 million points. Scan at 300 dots per inch, or photograph the page instead.'
const unreadable =
  'This picture cannot be opened: it is damaged or not complete. Choose it again, or photograph the page.'

/** sharp names its refusals only in words. */
const refusal = (error: unknown): AppError => {
  const message = error instanceof Error ? error.message : ''
  if (/pixel limit/i.test(message)) return invalid({ file: tooManyPixels })
  if (/timeout/i.test(message))
    return invalid({
      file: 'This picture takes too long to open. Scan at 300 dots per inch, or photograph the page.',
    })
  return invalid({ file: unreadable })
}

const encode = (picture: Sharp, type: SampleType): Sharp => {
  if (type === 'image/png') return picture.png({ compressionLevel: 7 })
  if (type === 'image/webp') return picture.webp({ quality: 90 })
  return picture.jpeg({ quality: 90 })
}

const checkHeader = (metadata: Metadata, type: SampleType) => {
  if (metadata.format !== formatOf[type]) throw new Error('another format than the first bytes say')
  if (metadata.width * metadata.height > maximumPixels) throw new Error('pixel limit')
  if ((metadata.pages ?? 1) > 1) throw invalid({ file: 'This picture moves. Choose a still picture.' })
}

const decode = async (bytes: Buffer, type: SampleType) => {
  const metadata = await open(bytes).metadata()
  checkHeader(metadata, type)
  const upright = open(bytes).autoOrient().timeout({ seconds: patienceSeconds })
  const { data, info } = await encode(upright, type).toBuffer({ resolveWithObject: true })
  const thumbnail = await open(data)
    .resize({ width: thumbnailEdge, height: thumbnailEdge, fit: 'inside', withoutEnlargement: true })
    .flatten({ background: '#ffffff' })
    .timeout({ seconds: patienceSeconds })
    .jpeg({ quality: 75 })
    .toBuffer()
  return { metadata, data, info, thumbnail }
}

/**
 * Decodes a picture whole and encodes it anew: upright, in sRGB, without metadata or trailing bytes. The scan density
 * is read before it is dropped, so that sizes in mm stay measurable. Throws 422 for what cannot be opened in full.
 */
export const readImage = async (bytes: Buffer, type: SampleType) => {
  try {
    const { metadata, data, info, thumbnail } = await decode(bytes, type)
    return {
      content: data,
      thumbnail,
      width: info.width,
      height: info.height,
      pixelsPerMm: pixelsPerMmOf(metadata.density ?? null),
    }
  } catch (error) {
    throw error instanceof AppError ? error : refusal(error)
  }
}
