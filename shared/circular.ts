export interface CircularMean {
  /** 0 up to 360 degrees (0 up to 180 for lines); null when the directions cancel out. */
  degrees: number | null
  /** Length of the mean vector, 0 (no direction) to 1 (all alike). */
  resultant: number
}

/** Under this length the directions cancel out, and what is left is rounding. */
const noDirection = 1e-9

function wrapped(degrees: number, turn: number): number {
  const inside = ((degrees % turn) + turn) % turn
  // A hair below a full turn is zero: rounding at the wrap must not read as 360.
  return turn - inside < 1e-9 ? 0 : inside
}

function meanOf(degrees: readonly number[]): CircularMean | null {
  if (degrees.length === 0) return null
  const mean = (part: (angle: number) => number) =>
    degrees.reduce((sum, angle) => sum + part((angle * Math.PI) / 180), 0) / degrees.length
  const [cosine, sine] = [mean(Math.cos), mean(Math.sin)]
  const resultant = Math.min(1, Math.hypot(cosine, sine))
  if (resultant < noDirection) return { degrees: null, resultant }
  return { degrees: wrapped((Math.atan2(sine, cosine) * 180) / Math.PI, 360), resultant }
}

/**
 * Mean direction of angles in degrees, so that 1 and 359 give 0 and not 180. Null for no angle.
 * Mardia & Jupp 2000, Directional Statistics (from memory).
 */
export const circularMean = (degrees: readonly number[]): CircularMean | null => meanOf(degrees)

/** The same for lines without an arrow, such as slant: angles are doubled, averaged and halved. */
export function axialMean(degrees: readonly number[]): CircularMean | null {
  const doubled = meanOf(degrees.map((angle) => 2 * angle))
  if (!doubled) return null
  return {
    degrees: doubled.degrees === null ? null : wrapped(doubled.degrees / 2, 180),
    resultant: doubled.resultant,
  }
}
