import sharp from 'sharp'
import { shapeFor } from './rightToLeftStrokes.ts'
import { paperOf, pencilOf } from './samplePaper.ts'
import { seededRandom, type SeededRandom } from './seededRandom.ts'
import {
  paperMargins,
  sampleDpi,
  samplePixelsPerMm,
  type SampleDrawing,
  type Stroke,
} from './sampleDrawing.ts'
import { canBeMirrored, glyphFor, mirrored, type Glyph, type Point } from './strokeFont.ts'

/**
 * Draws the sample as PNG at 200 dpi. The same drawing always gives the same bytes. Throws on a character the stroke
 * font does not have, and when the text does not fit on the paper.
 */
export async function drawSample(drawing: SampleDrawing): Promise<Buffer> {
  return sharp(Buffer.from(sampleSvg(drawing)))
    .flatten({ background: '#FFFFFF' })
    .withMetadata({ density: sampleDpi })
    .png({ compressionLevel: 6 })
    .toBuffer()
}

/** The sample as SVG, one user unit for each millimetre. */
export function sampleSvg(drawing: SampleDrawing): string {
  const { widthMm, heightMm } = drawing
  const random = seededRandom(drawing.seed)
  const strokes = strokesOf(drawing, random)
  const pixels = (mm: number) => Math.round(mm * samplePixelsPerMm)
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${pixels(widthMm)}" height="${pixels(heightMm)}" viewBox="0 0 ${widthMm} ${heightMm}">`,
    paperOf(drawing),
    pencilOf(strokes, drawing, random),
    '</svg>',
  ].join('\n')
}

interface Placed {
  glyph: Glyph
  /** Left edge and baseline in millimetres, and size against the x-height asked for. */
  x: number
  y: number
  scale: number
  pressure: number
}

const unitsPerXHeight = 100
const isLetter = (character: string) => /\p{L}/u.test(character)

function strokesOf(drawing: SampleDrawing, random: SeededRandom): Stroke[] {
  const mmPerUnit = drawing.xHeightMm / unitsPerXHeight
  const shear = Math.tan((drawing.slantDegrees * Math.PI) / 180)
  return placeGlyphs(drawing, random).flatMap(({ glyph, x, y, scale, pressure }) => {
    const lean = shear + random.around(0.09 * drawing.jitter)
    const size = mmPerUnit * scale
    return glyph.strokes.map((stroke) => ({
      pressure: pressure * (1 + random.around(0.12 * drawing.jitter)),
      points: wobble(
        stroke.map((point) => ({ x: x + (point.x + point.y * lean) * size, y: y - point.y * size })),
        drawing.xHeightMm * 0.05 * drawing.jitter,
        random,
      ),
    }))
  })
}

/** A hand does not tremble at every point: the deviation drifts from one point to the next. */
function wobble(points: readonly Point[], size: number, random: SeededRandom): Point[] {
  let offset: Point = { x: random.around(size), y: random.around(size) }
  return points.map(({ x, y }) => {
    offset = { x: offset.x * 0.72 + random.around(size), y: offset.y * 0.72 + random.around(size) }
    return { x: x + offset.x, y: y + offset.y }
  })
}

function placeGlyphs(drawing: SampleDrawing, random: SeededRandom): Placed[] {
  const { text, jitter, xHeightMm, widthMm, heightMm, lineSpacingMm, script } = drawing
  const turned = lettersToMirror(drawing, random)
  const mmPerUnit = xHeightMm / unitsPerXHeight
  const rightToLeft = script === 'right_to_left_shapes'
  const [start, end] = [paperMargins.leftMm + 2, widthMm - paperMargins.rightMm]
  const gap = rightToLeft ? 0 : 26
  const placed: Placed[] = []
  let row = 0
  // Measured from where the line begins, whichever side that is.
  let along = 0
  let index = 0

  for (const word of text.split(' ')) {
    const glyphs = [...word].map((character) => {
      const glyph = rightToLeft ? shapeFor(character) : glyphFor(character)
      const turn = isLetter(character) && turned.has(index)
      index += 1
      return turn ? mirrored(glyph) : glyph
    })
    index += 1
    const wordMm = glyphs.reduce((sum, glyph) => sum + (glyph.width + gap) * mmPerUnit, 0)
    if (along > 0 && start + along + wordMm > end) {
      row += 1
      along = random.unit() * 1.6 * jitter
    }
    const ruled = paperMargins.topMm + row * lineSpacingMm
    if (ruled > heightMm - 4) throw new Error('The text does not fit on the paper')
    for (const glyph of glyphs) {
      const scale = 1 + random.around(0.13 * jitter)
      const advance = glyph.width * mmPerUnit * scale
      const drift = (drawing.driftMm * along) / 100
      const bounce = random.around(0.14 * jitter * xHeightMm)
      placed.push({
        glyph,
        x: rightToLeft ? end - along - advance : start + along,
        y: ruled - 0.4 + drift + bounce,
        scale,
        pressure: 1 + random.around(0.18 * jitter),
      })
      along += advance + gap * mmPerUnit * (1 + random.around(0.55 * jitter))
    }
    along += 62 * mmPerUnit * (1 + random.around(0.4 * jitter))
  }
  return placed
}

/** Positions in the text of the letters to turn round. */
function lettersToMirror(
  { text, mirroredLetters, script }: SampleDrawing,
  random: SeededRandom,
): Set<number> {
  if (mirroredLetters === 0 || script !== 'latin') return new Set()
  const candidates = [...text].flatMap((character, index) => (canBeMirrored(character) ? [index] : []))
  if (candidates.length < mirroredLetters)
    throw new Error('The text has too few letters that can be turned round')
  return new Set(random.shuffled(candidates).slice(0, mirroredLetters))
}
