import { paperMargins, type SampleDrawing, type Stroke } from './sampleDrawing.ts'
import type { SeededRandom } from './seededRandom.ts'
import type { Point } from './strokeFont.ts'

const paperColour = '#FBFAF4'
const ruleColour = '#B9CBE0'
const marginColour = '#E0A9A4'
const graphite = '#34343C'
const pencilWidthMm = 0.6

const short = (value: number) => String(Math.round(value * 1000) / 1000)

/** Exercise-book paper: ruled lines, a margin on the left, a little tooth. */
export function paperOf({ widthMm, heightMm, lineSpacingMm }: SampleDrawing): string {
  const rows = Math.floor((heightMm - 4 - paperMargins.topMm) / lineSpacingMm) + 1
  const rules = Array.from({ length: rows }, (_, row) => {
    const y = short(paperMargins.topMm + row * lineSpacingMm)
    return `<line x1="0" y1="${y}" x2="${widthMm}" y2="${y}"/>`
  })
  return [
    '<defs>',
    // Paper takes graphite on its grain and not between: the stroke is thinned by fine noise.
    '<filter id="grain" x="-5%" y="-5%" width="110%" height="110%">',
    '<feTurbulence type="fractalNoise" baseFrequency="2.6" numOctaves="2" seed="7" result="noise"/>',
    '<feColorMatrix in="noise" type="matrix" values="0 0 0 0 0  0 0 0 0 0  0 0 0 0 0  0 0 0 -2.4 2.05" result="tooth"/>',
    '<feComposite in="SourceGraphic" in2="tooth" operator="in"/>',
    '</filter>',
    '<filter id="smear" x="-10%" y="-10%" width="125%" height="120%"><feGaussianBlur stdDeviation="1.3 0.16"/></filter>',
    '<filter id="rub" x="-20%" y="-40%" width="140%" height="180%"><feGaussianBlur stdDeviation="3 0.7"/></filter>',
    '</defs>',
    `<rect width="${widthMm}" height="${heightMm}" fill="${paperColour}"/>`,
    `<g stroke="${ruleColour}" stroke-width="0.22">${rules.join('')}</g>`,
    `<line x1="${paperMargins.leftMm}" y1="0" x2="${paperMargins.leftMm}" y2="${heightMm}" stroke="${marginColour}" stroke-width="0.25"/>`,
  ].join('\n')
}

/** The strokes as pencil, and the traces of a hand that follows them over the page. */
export function pencilOf(strokes: readonly Stroke[], drawing: SampleDrawing, random: SeededRandom): string {
  const parts = strokes.map((stroke) => pencilStroke(stroke, random))
  return [smudgeOf(strokes, drawing, random), `<g filter="url(#grain)">${parts.join('\n')}</g>`].join('\n')
}

/** A smooth path through the points: each one is the corner that the curve is bent towards. */
function smoothPath(points: readonly Point[]): string {
  const [first, ...rest] = points
  if (!first) return ''
  const parts = [`M${short(first.x)} ${short(first.y)}`]
  for (const [index, point] of rest.entries()) {
    const next = rest[index + 1]
    const to = next ? { x: (point.x + next.x) / 2, y: (point.y + next.y) / 2 } : point
    parts.push(`Q${short(point.x)} ${short(point.y)} ${short(to.x)} ${short(to.y)}`)
  }
  return parts.join('')
}

function pencilStroke({ points, pressure }: Stroke, random: SeededRandom): string {
  const path = smoothPath(points)
  const width = pencilWidthMm * pressure
  const opacity = Math.min(0.95, 0.74 * pressure + random.around(0.05))
  const line = (w: number, o: number) =>
    `<path d="${path}" fill="none" stroke="${graphite}" stroke-width="${short(w)}" stroke-opacity="${short(o)}" stroke-linecap="round" stroke-linejoin="round"/>`
  // A wide faint line under a narrow dark one gives the soft edge of a pencil.
  return line(width, opacity * 0.62) + line(width * 0.55, opacity * 0.7)
}

const smears = {
  light: { copies: 1, opacity: 0.16, rubs: 0.2 },
  heavy: { copies: 2, opacity: 0.27, rubs: 0.6 },
} as const

/** A left hand moving right drags graphite with it: the smear lies to the right of what was written. */
function smudgeOf(
  strokes: readonly Stroke[],
  { smudge, script, xHeightMm }: SampleDrawing,
  random: SeededRandom,
) {
  if (smudge === 'none') return ''
  const { copies, opacity, rubs } = smears[smudge]
  const direction = script === 'latin' ? 1 : -1
  const dragged = Array.from({ length: copies }, (_, copy) => {
    const paths = strokes
      .filter(() => random.unit() < 0.75)
      .map(({ points }) => `<path d="${smoothPath(points)}"/>`)
      .join('')
    const shift = short(direction * (0.9 + copy * 1.3))
    return `<g filter="url(#smear)" transform="translate(${shift} 0.15)" fill="none" stroke="${graphite}" stroke-width="0.7" stroke-opacity="${opacity}">${paths}</g>`
  })
  const patches = strokes
    .filter(() => random.unit() < rubs * 0.22)
    .map(({ points }) => {
      const { x, y } = points[Math.floor(points.length / 2)] ?? { x: 0, y: 0 }
      const [rx, ry] = [xHeightMm * (0.9 + random.unit()), xHeightMm * (0.12 + random.unit() * 0.2)]
      return `<ellipse cx="${short(x + direction * 3.5)}" cy="${short(y)}" rx="${short(rx)}" ry="${short(ry)}"/>`
    })
  return [
    ...dragged,
    `<g filter="url(#rub)" fill="${graphite}" fill-opacity="${short(opacity * 0.6)}">${patches.join('')}</g>`,
  ].join('\n')
}
