import { crc32, deflateSync } from 'node:zlib'
import sharp from 'sharp'

/** Black on white with one dark corner, so that every turn and every mirror image looks different. */
const upright = { width: 96, height: 64 }
export const isDark = (x: number, y: number) => x < upright.width / 3 && y < upright.height / 4

type Format = 'jpeg' | 'png' | 'webp'

const grey = (width: number, height: number, dark: (x: number, y: number) => boolean) => {
  const pixels = Buffer.alloc(width * height, 255)
  for (let y = 0; y < height; y += 1)
    for (let x = 0; x < width; x += 1) if (dark(x, y)) pixels[y * width + x] = 0
  return sharp(pixels, { raw: { width, height, channels: 1 } })
}

export const picture = (format: Format = 'jpeg', dotsPerInch: number | null = null): Promise<Buffer> => {
  const drawn = grey(upright.width, upright.height, isDark).toFormat(format)
  return (dotsPerInch === null ? drawn : drawn.withMetadata({ density: dotsPerInch })).toBuffer()
}

/**
 * The same picture as a camera held in one of eight ways stores it. What row 0 and column 0 of the stored picture are
 * seen as is the definition of the EXIF orientation tag (TIFF 6.0, tag 274).
 */
export const heldAs = (orientation: number): Promise<Buffer> => {
  const { width, height } = upright
  const right = width - 1
  const bottom = height - 1
  const seenAt: Record<number, (row: number, column: number) => [x: number, y: number]> = {
    1: (row, column) => [column, row],
    2: (row, column) => [right - column, row],
    3: (row, column) => [right - column, bottom - row],
    4: (row, column) => [column, bottom - row],
    5: (row, column) => [row, column],
    6: (row, column) => [right - row, column],
    7: (row, column) => [right - row, bottom - column],
    8: (row, column) => [row, bottom - column],
  }
  const turned = orientation > 4
  const place = seenAt[orientation]
  if (!place) throw new Error('no such orientation')
  return grey(turned ? height : width, turned ? width : height, (column, row) =>
    isDark(...place(row, column)),
  )
    .jpeg({ quality: 95 })
    .withMetadata({ orientation })
    .toBuffer()
}

/** With everything a phone writes beside the picture, and bytes after its end. */
export const withSecrets = async (format: 'jpeg' | 'webp' = 'jpeg'): Promise<Buffer> => {
  const dressed = await grey(upright.width, upright.height, isDark)
    .toFormat(format)
    .withExif({
      IFD0: { Artist: 'Canary Photographer', ImageDescription: 'Canary description' },
      IFD3: {
        GPSLatitudeRef: 'N',
        GPSLatitude: '51/1 28/1 38/1',
        GPSLongitudeRef: 'W',
        GPSLongitude: '0/1 0/1 0/1',
      },
    })
    .withXmp('<x:xmpmeta xmlns:x="adobe:ns:meta/"><canary>Canary XMP</canary></x:xmpmeta>')
    .toBuffer()
  if (format === 'webp') return dressed
  const comment = Buffer.from('Canary comment', 'latin1')
  const segment = Buffer.concat([Buffer.from([0xff, 0xfe, 0, comment.length + 2]), comment])
  return Buffer.concat([
    dressed.subarray(0, 2),
    segment,
    dressed.subarray(2),
    Buffer.from('PK\x03\x04 Canary trailer'),
  ])
}

const chunk = (type: string, data: Buffer): Buffer => {
  const body = Buffer.concat([Buffer.from(type, 'latin1'), data])
  const frame = Buffer.alloc(8)
  frame.writeUInt32BE(data.length, 0)
  frame.writeUInt32BE(crc32(body), 4)
  return Buffer.concat([frame.subarray(0, 4), body, frame.subarray(4)])
}

const pngSignature = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a])

/** A white PNG of one bit a point: very many points in very few bytes. */
export const bomb = (edge: number): Buffer => {
  const head = Buffer.from([0, 0, 0, 0, 0, 0, 0, 0, 1, 0, 0, 0, 0])
  head.writeUInt32BE(edge, 0)
  head.writeUInt32BE(edge, 4)
  const rows = deflateSync(Buffer.alloc(edge * (1 + Math.ceil(edge / 8))), { level: 9 })
  return Buffer.concat([
    pngSignature,
    chunk('IHDR', head),
    chunk('IDAT', rows),
    chunk('IEND', Buffer.alloc(0)),
  ])
}

/** A picture with so many zero bytes after its end that it has exactly this size. */
export const paddedTo = async (bytes: number): Promise<Buffer> => {
  const drawn = await picture('jpeg')
  return Buffer.concat([drawn, Buffer.alloc(bytes - drawn.length)])
}

/** A WebP of two frames. */
export const moving = async (): Promise<Buffer> => {
  const frames = await Promise.all(
    [false, true].map((dark) =>
      grey(8, 8, () => dark)
        .png()
        .toBuffer(),
    ),
  )
  return sharp(frames, { join: { animated: true } })
    .webp({ loop: 0, delay: [100, 100] })
    .toBuffer()
}
