import sharp from 'sharp'
import { describe, expect, it } from 'vitest'
import { drawSample } from '../../server/seeds/drawSample.ts'
import { paperMargins, type SampleDrawing } from '../../server/seeds/sampleDrawing.ts'

const machine: SampleDrawing = {
  seed: 5,
  text: 'x',
  slantDegrees: 0,
  xHeightMm: 6,
  jitter: 0,
  driftMm: 0,
  smudge: 'none',
  mirroredLetters: 0,
  script: 'latin',
  widthMm: 100,
  heightMm: 60,
  lineSpacingMm: 10,
}

// 200 dots an inch of 25.4 mm.
const pixels = (mm: number) => (mm * 200) / 25.4

interface Picture {
  width: number
  height: number
  at: (x: number, y: number) => [red: number, green: number, blue: number]
}

async function picture(drawing: SampleDrawing): Promise<Picture> {
  const { data, info } = await sharp(await drawSample(drawing))
    .removeAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true })
  return {
    width: info.width,
    height: info.height,
    at: (x, y) => {
      const start = (y * info.width + x) * info.channels
      return [data[start]!, data[start + 1]!, data[start + 2]!]
    },
  }
}

/** Positions of pencil, told from blue rules and red margin by being dark in every colour. */
function ink({ width, height, at }: Picture): { x: number; y: number }[] {
  const found: { x: number; y: number }[] = []
  for (let y = 0; y < height; y += 1)
    for (let x = Math.ceil(pixels(paperMargins.leftMm + 1)); x < width; x += 1)
      if (Math.max(...at(x, y)) < 150) found.push({ x, y })
  return found
}

const range = (values: number[]) => Math.max(...values) - Math.min(...values)

describe('drawSample', () => {
  it('gives the same bytes for the same drawing and others for another seed', async () => {
    const shaky = { ...machine, text: 'my dog ran', jitter: 0.6, smudge: 'heavy' as const }
    const once = await drawSample(shaky)
    expect((await drawSample(shaky)).equals(once)).toBe(true)
    expect((await drawSample({ ...shaky, seed: 6 })).equals(once)).toBe(false)
  })

  it('is a PNG of the paper’s size at 200 dpi and says so', async () => {
    const { format, width, height, density } = await sharp(await drawSample(machine)).metadata()
    expect({ format, width, height, density }).toEqual({
      format: 'png',
      width: Math.round(pixels(100)),
      height: Math.round(pixels(60)),
      density: 200,
    })
  })

  it('rules the paper at the spacing asked for', async () => {
    const page = await picture(machine)
    const ruled = Array.from({ length: page.height }, (_, y) => y).filter((y) => {
      const [red, , blue] = page.at(page.width - 20, y)
      return blue - red > 20
    })
    const centres = ruled.filter((y) => !ruled.includes(y - 1))
    expect(centres).toHaveLength(4)
    expect((centres.at(-1)! - centres[0]!) / 3).toBeCloseTo(pixels(10), 0)
  })

  it.each([3, 6, 9])('writes an x-height of %i mm', async (xHeightMm) => {
    const rows = ink(await picture({ ...machine, xHeightMm })).map(({ y }) => y)
    // The pencil is about half a millimetre wide.
    expect(range(rows) / pixels(1)).toBeGreaterThan(xHeightMm - 0.1)
    expect(range(rows) / pixels(1)).toBeLessThan(xHeightMm + 0.8)
  })

  it.each([-15, 0, 15])('leans upright strokes by %i degrees', async (slantDegrees) => {
    const stem = ink(await picture({ ...machine, text: 'p', slantDegrees })).filter(
      ({ y }) => y > pixels(18.5),
    )
    const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length
    const [mx, my] = [mean(stem.map(({ x }) => x)), mean(stem.map(({ y }) => y))]
    const slope =
      stem.reduce((sum, { x, y }) => sum + (x - mx) * (my - y), 0) /
      stem.reduce((sum, { y }) => sum + (y - my) ** 2, 0)
    expect((Math.atan(slope) * 180) / Math.PI).toBeCloseTo(slantDegrees, -0.5)
  })

  it('lets the writing sink by the drift asked for', async () => {
    const page = await picture({
      ...machine,
      widthMm: 160,
      text: 'x xxxxxxxxxxx x',
      xHeightMm: 4,
      driftMm: 6,
    })
    const found = ink(page)
    const first = Math.min(...found.map(({ x }) => x))
    const last = Math.max(...found.map(({ x }) => x))
    const bottom = (from: number, to: number) =>
      Math.max(...found.filter(({ x }) => x >= from && x <= to).map(({ y }) => y))
    const sunk = bottom(last - pixels(4), last) - bottom(first, first + pixels(4))
    expect(sunk / (last - first)).toBeCloseTo(0.06, 2)
  })

  it('turns a letter round like a mirror', async () => {
    const columns = async (mirroredLetters: number) => {
      const found = ink(await picture({ ...machine, text: 'b', mirroredLetters }))
      const left = Math.min(...found.map(({ x }) => x))
      const width = range(found.map(({ x }) => x))
      return found.filter(({ x }) => x - left < width / 4).length / found.length
    }
    // The stem of a b is its left quarter; turned round, the stem is on the right.
    expect(await columns(0)).toBeGreaterThan(0.45)
    expect(await columns(1)).toBeLessThan(0.25)
  })

  it('darkens the paper more with heavy smudging than with light, and not at all without', async () => {
    const grey = async (smudge: SampleDrawing['smudge']) => {
      const { channels } = await sharp(await drawSample({ ...machine, text: 'my dog', smudge })).stats()
      return 255 - channels[0]!.mean
    }
    const [none, light, heavy] = [await grey('none'), await grey('light'), await grey('heavy')]
    expect(light).toBeGreaterThan(none)
    expect(heavy).toBeGreaterThan(light)
  })

  it('writes from the right in the right-to-left shapes', async () => {
    const found = ink(await picture({ ...machine, text: 'abc', script: 'right_to_left_shapes' })).map(
      ({ x }) => x,
    )
    expect(Math.max(...found) / pixels(1)).toBeGreaterThan(100 - paperMargins.rightMm - 4)
    expect(Math.min(...found) / pixels(1)).toBeGreaterThan(50)
  })

  it.each([
    ['a character without strokes', { text: 'é' }, 'no é'],
    ['more text than paper', { text: 'word '.repeat(60).trim() }, 'does not fit'],
    ['more turned letters than there are', { text: 'xo', mirroredLetters: 1 }, 'too few letters'],
  ])('refuses %s', async (_what, changes, message) => {
    await expect(drawSample({ ...machine, ...changes })).rejects.toThrow(message)
  })

  it('has strokes for every lower-case letter and the marks of a sentence', async () => {
    const text = 'abc def ghi jkl mno pqr stu vwx yz. , ’ - ? !'
    await expect(drawSample({ ...machine, text, xHeightMm: 3 })).resolves.toBeInstanceOf(Buffer)
  })
})
