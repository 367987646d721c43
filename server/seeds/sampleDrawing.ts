import type { Point } from './strokeFont.ts'

/** A made-up piece of a child's writing. Lengths in millimetres on paper, angles in degrees. */
export interface SampleDrawing {
  seed: number
  /** Lower-case text; for the right-to-left shapes only the lengths of its words matter. */
  text: string
  /** Lean of the upright strokes: positive to the right, negative to the left. */
  slantDegrees: number
  xHeightMm: number
  /** Unevenness of line, size and spacing: 0 is a machine, 1 is a very shaky hand. */
  jitter: number
  /** How far the writing sinks below the ruled line over 100 mm; negative when it climbs. */
  driftMm: number
  smudge: 'none' | 'light' | 'heavy'
  /** How many letters are turned round. */
  mirroredLetters: number
  script: 'latin' | 'right_to_left_shapes'
  widthMm: number
  heightMm: number
  lineSpacingMm: number
}

/** A scanner's usual setting; the picture carries it, so that its scale is known. */
export const sampleDpi = 200
export const samplePixelsPerMm = sampleDpi / 25.4

/** Free paper left of the writing, and above the first ruled line. */
export const paperMargins = { leftMm: 22, rightMm: 10, topMm: 18 }

/** One pencil stroke on the page, in millimetres from the top left corner, with how hard the pencil was pressed. */
export interface Stroke {
  points: Point[]
  pressure: number
}
