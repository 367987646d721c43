/** Application segments that say how to draw the picture: JFIF, ICC profile and Adobe colour transform. */
const drawing = new Set([0xe0, 0xe2, 0xee])
const comment = 0xfe
const startOfScan = 0xda
const endOfImage = 0xd9

const isApplication = (marker: number) => marker >= 0xe0 && marker <= 0xef
const isMetadata = (marker: number) => marker === comment || (isApplication(marker) && !drawing.has(marker))

/** End of the entropy-coded bytes after a scan header: the next marker that is neither stuffing nor a restart. */
const endOfScan = (jpeg: Buffer, from: number): number => {
  let at = from
  for (; at < jpeg.length - 1; at += 1) {
    const next = jpeg[at + 1] ?? 0
    if (jpeg[at] === 0xff && next !== 0 && next !== 0xff && !(next >= 0xd0 && next <= 0xd7)) return at
  }
  return jpeg.length
}

/**
 * A JPEG without EXIF, XMP, IPTC, comments and bytes after its end (segments after ITU-T T.81, annex B). The picture
 * itself is copied as it is. What does not read as JPEG to its end is kept from there on.
 */
export const withoutJpegMetadata = (jpeg: Buffer): Buffer => {
  const kept: Buffer[] = [jpeg.subarray(0, 2)]
  let at = 2
  while (at + 4 <= jpeg.length && jpeg[at] === 0xff) {
    const marker = jpeg[at + 1] ?? 0
    if (marker === endOfImage) return Buffer.concat([...kept, jpeg.subarray(at, at + 2)])
    const end = at + 2 + jpeg.readUInt16BE(at + 2)
    if (!isMetadata(marker)) kept.push(jpeg.subarray(at, end))
    at = end
    if (marker === startOfScan) {
      const scanned = endOfScan(jpeg, at)
      kept.push(jpeg.subarray(at, scanned))
      at = scanned
    }
  }
  return Buffer.concat([...kept, jpeg.subarray(at)])
}
