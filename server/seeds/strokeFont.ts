export interface Point {
  x: number
  y: number
}

/** A letter as the pen moves. Units: x-height 100, baseline 0, y upward. */
export interface Glyph {
  strokes: Point[][]
  width: number
}

/*
 * Our own letters, drawn for a child's print hand. Each stroke is one touch of the pencil:
 *   M x y          put the pencil down
 *   L x y          straight to
 *   Q cx cy x y    curve to, bent towards (cx, cy)
 *   A cx cy rx ry from to   along an ellipse, angles in degrees, anticlockwise from three o'clock
 */
const letters: Record<string, string[]> = {
  a: ['A 42 50 42 50 45 400', 'M 85 100 L 84 18 Q 84 0 100 4'],
  b: ['M 8 190 L 8 2', 'A 47 50 40 50 165 -170'],
  c: ['A 45 50 44 50 42 318'],
  d: ['A 42 50 42 50 45 400', 'M 85 190 L 84 16 Q 84 0 99 4'],
  e: ['M 6 50 L 84 54 Q 84 100 46 100 Q 4 98 4 50 Q 4 2 46 0 Q 70 0 82 18'],
  f: ['M 76 172 Q 66 192 50 188 Q 32 184 32 148 L 32 0', 'M 4 98 L 68 100'],
  g: ['A 42 50 42 50 45 400', 'M 85 100 L 84 -48 Q 84 -90 44 -92 Q 18 -92 8 -72'],
  h: ['M 8 190 L 8 0', 'M 8 58 Q 22 100 50 100 Q 80 100 80 60 L 80 0'],
  i: ['M 12 100 L 12 14 Q 13 0 28 5', 'M 12 140 L 15 143'],
  j: ['M 40 100 L 40 -50 Q 40 -90 12 -92 Q -2 -92 -8 -76', 'M 40 140 L 43 143'],
  k: ['M 8 190 L 8 0', 'M 68 98 L 10 42', 'M 24 56 L 74 0'],
  l: ['M 12 190 L 12 18 Q 12 0 32 5'],
  m: [
    'M 8 100 L 8 0',
    'M 8 58 Q 20 100 42 100 Q 64 100 64 62 L 64 0',
    'M 64 58 Q 76 100 98 100 Q 120 100 120 62 L 120 0',
  ],
  n: ['M 8 100 L 8 0', 'M 8 56 Q 22 100 48 100 Q 78 100 78 60 L 78 0'],
  o: ['A 45 50 45 50 70 435'],
  p: ['M 8 100 L 8 -92', 'A 47 50 40 50 165 -170'],
  q: ['A 42 50 42 50 45 400', 'M 85 100 L 84 -92 L 104 -66'],
  r: ['M 8 100 L 8 0', 'M 8 54 Q 20 100 56 96'],
  s: ['M 74 84 Q 62 102 40 100 Q 12 98 14 74 Q 18 56 44 50 Q 76 42 74 22 Q 70 -2 38 0 Q 14 0 5 18'],
  t: ['M 32 162 L 32 22 Q 34 -2 62 7', 'M 2 98 L 64 101'],
  u: ['M 8 100 L 8 38 Q 10 0 42 0 Q 72 2 78 42', 'M 78 100 L 78 0'],
  v: ['M 4 100 L 40 0 L 76 100'],
  w: ['M 4 100 L 30 0 L 56 88 L 82 0 L 108 100'],
  x: ['M 6 100 L 74 0', 'M 72 100 L 6 0'],
  y: ['M 8 100 L 9 44 Q 12 4 42 4 Q 70 6 80 44', 'M 80 100 L 79 -46 Q 76 -90 40 -92 Q 18 -92 8 -74'],
  z: ['M 6 98 L 72 98 L 6 2 L 78 2'],
  '.': ['M 8 4 L 12 6'],
  ',': ['M 14 10 Q 14 -8 2 -24'],
  '’': ['M 12 190 L 4 162'],
  '-': ['M 6 48 L 58 50'],
  '?': ['M 6 150 Q 10 190 44 188 Q 78 184 72 146 Q 66 118 40 96 L 40 62', 'M 40 6 L 43 9'],
  '!': ['M 14 186 L 12 56', 'M 12 6 L 15 9'],
}

const curveSteps = 10

function trace(stroke: string): Point[] {
  const tokens = stroke.split(' ')
  const points: Point[] = []
  let at = 0
  const number = () => Number(tokens[at++])
  while (at < tokens.length) {
    const command = tokens[at++]
    const last = points.at(-1)
    if (command === 'M' || (command === 'L' && !last)) points.push({ x: number(), y: number() })
    else if (command === 'L' && last) line(points, last, { x: number(), y: number() })
    else if (command === 'Q' && last)
      quadratic(points, last, { x: number(), y: number() }, { x: number(), y: number() })
    else if (command === 'A') ellipse(points, number(), number(), number(), number(), number(), number())
    else throw new Error(`Stroke cannot be read at ${command}: ${stroke}`)
  }
  return points
}

const mix = (a: number, b: number, part: number) => a + (b - a) * part

function line(points: Point[], from: Point, to: Point) {
  const steps = Math.max(2, Math.round(Math.hypot(to.x - from.x, to.y - from.y) / 14))
  for (let step = 1; step <= steps; step += 1)
    points.push({ x: mix(from.x, to.x, step / steps), y: mix(from.y, to.y, step / steps) })
}

function quadratic(points: Point[], from: Point, bend: Point, to: Point) {
  for (let step = 1; step <= curveSteps; step += 1) {
    const part = step / curveSteps
    points.push({
      x: mix(mix(from.x, bend.x, part), mix(bend.x, to.x, part), part),
      y: mix(mix(from.y, bend.y, part), mix(bend.y, to.y, part), part),
    })
  }
}

function ellipse(points: Point[], cx: number, cy: number, rx: number, ry: number, from: number, to: number) {
  const steps = Math.max(4, Math.round(Math.abs(to - from) / 12))
  for (let step = 0; step <= steps; step += 1) {
    const angle = (mix(from, to, step / steps) * Math.PI) / 180
    points.push({ x: cx + rx * Math.cos(angle), y: cy + ry * Math.sin(angle) })
  }
}

/** Builds a glyph from strokes in the notation above. Throws on a stroke that cannot be read. */
export function glyphOf(strokes: readonly string[]): Glyph {
  const traced = strokes.map(trace)
  return { strokes: traced, width: Math.max(...traced.flat().map(({ x }) => x)) }
}

const glyphs = new Map(Object.entries(letters).map(([letter, strokes]) => [letter, glyphOf(strokes)]))

/** The glyph of a lower-case letter or mark. Throws on one that the font does not have. */
export function glyphFor(character: string): Glyph {
  const glyph = glyphs.get(character)
  if (!glyph) throw new Error(`The stroke font has no ${character}`)
  return glyph
}

/** The same glyph turned round, as a child may write it. */
export const mirrored = ({ strokes, width }: Glyph): Glyph => ({
  width,
  strokes: strokes.map((stroke) => stroke.map(({ x, y }) => ({ x: width - x, y }))),
})

/** Letters that look different in a mirror. */
export const canBeMirrored = (character: string) => /[abcdefghjkpqrstyz]/.test(character)
