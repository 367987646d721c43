import type { SampleScript, SampleTask, SmudgeLevel } from '../../../shared/handwriting.ts'
import type { SampleDrawing } from '../sampleDrawing.ts'
import type { DemoSample, Offset } from './demoTypes.ts'
import type { StaffKey } from './people.ts'
import { firstLetters, type ModelText } from './sampleTexts.ts'

/** How the hand looks: lean in degrees, x-height in mm, unevenness 0 to 1, sinking in mm over 100 mm. */
type Hand = [slantDegrees: number, xHeightMm: number, jitter: number, driftMm: number]

interface Parts {
  seconds?: number
  task?: SampleTask
  script?: SampleScript
  reversals?: number
  lineAdherence?: number
  note?: string
  removedDay?: Offset
}

const paperWidthMm = 170

/** Paper that holds the text with a line to spare. */
function sheet(
  text: string,
  xHeightMm: number,
): Pick<SampleDrawing, 'widthMm' | 'heightMm' | 'lineSpacingMm'> {
  const lineSpacingMm = Math.max(9, Math.round(xHeightMm * 2.7))
  const rows = Math.ceil((text.length * xHeightMm * 0.82) / (paperWidthMm - 40)) + 1
  return { widthMm: paperWidthMm, heightMm: 24 + rows * lineSpacingMm, lineSpacingMm }
}

/** One sample: `letters` were written in the time, `legible` of them can be read. The picture shows exactly these letters. */
function sample(
  child: number,
  takenDay: Offset,
  by: StaffKey,
  model: ModelText,
  [letters, legible]: [letters: number, legible: number],
  smudge: SmudgeLevel,
  [slantDegrees, xHeightMm, jitter, driftMm]: Hand,
  {
    seconds = 60,
    task = 'copy',
    script = 'print',
    reversals = 0,
    lineAdherence,
    note,
    removedDay,
  }: Parts = {},
): DemoSample {
  const text = firstLetters(model, letters)
  return {
    child,
    takenDay,
    by,
    details: {
      task,
      script,
      seconds,
      letters,
      legibleLetters: legible,
      reversals,
      smudge,
      lineAdherence: lineAdherence ?? (jitter > 0.6 ? 2 : jitter > 0.4 ? 3 : 4),
      otherChildVisible: false,
      note: note ?? null,
    },
    drawing: {
      seed: child * 1000 - takenDay,
      text,
      slantDegrees,
      xHeightMm,
      jitter,
      driftMm,
      smudge,
      mirroredLetters: reversals,
      script: script === 'right_to_left' ? 'right_to_left_shapes' : 'latin',
      ...sheet(text, xHeightMm),
    },
    removedDay: removedDay ?? null,
  }
}

export const samples: readonly DemoSample[] = [
  sample(1, -124, 'adaeze', 'middle', [41, 31], 'heavy', [-9, 4.2, 0.8, 3.5]),
  sample(1, -92, 'adaeze', 'middle', [46, 37], 'heavy', [-7, 4, 0.65, 2.5]),
  sample(1, -60, 'adaeze', 'middle', [52, 45], 'light', [-5, 3.7, 0.5, 1.5]),
  sample(1, -28, 'adaeze', 'middle', [58, 53], 'light', [-4, 3.4, 0.38, 0.8]),
  sample(2, -97, 'adaeze', 'middle', [50, 48], 'none', [-12, 3.2, 0.22, 0.4], {
    note: 'Hand above the line throughout. No pain.',
  }),
  sample(3, -98, 'rohan', 'middle', [38, 30], 'light', [6, 4, 0.6, -1.5]),
  sample(3, -24, 'rohan', 'middle', [44, 38], 'light', [4, 3.7, 0.45, -0.8]),
  sample(4, -125, 'mairi', 'middle', [36, 30], 'light', [-4, 4, 0.5, 1]),
  sample(4, -124, 'mairi', 'middle', [48, 46], 'none', [0, 3.4, 0.25, 0.3], {
    script: 'right_to_left',
    note: 'Dari, copied from a card brought by the family.',
  }),
  sample(4, -40, 'mairi', 'middle', [45, 40], 'light', [-3, 3.6, 0.4, 0.6]),
  sample(5, -250, 'tomasz', 'middle', [34, 25], 'heavy', [-8, 4.4, 0.75, 2.5]),
  sample(5, -119, 'tomasz', 'middle', [45, 38], 'light', [-5, 3.8, 0.5, 1.4]),
  sample(6, -290, 'adaeze', 'young', [27, 18], 'heavy', [3, 5, 0.8, 2]),
  sample(6, -44, 'adaeze', 'middle', [51, 47], 'light', [2, 3.6, 0.35, 0.6]),
  sample(10, -33, 'rohan', 'young', [11, 7], 'none', [0, 7, 0.8, 0], {
    task: 'free',
    note: 'Changed hands after the fourth letter.',
  }),
  sample(11, -42, 'mairi', 'young', [14, 10], 'light', [-6, 6.5, 0.7, 1], {
    note: 'First filed under Axel; put right the same day.',
  }),
  sample(12, -42, 'mairi', 'young', [14, 10], 'light', [-6, 6.5, 0.7, 1], {
    removedDay: -42,
    note: 'This is Freya’s page.',
  }),
  sample(12, -41, 'mairi', 'young', [16, 12], 'none', [7, 6.2, 0.65, -1]),
  sample(13, -80, 'adaeze', 'young', [19, 13], 'light', [-7, 6, 0.7, 1.5]),
  sample(13, -20, 'adaeze', 'young', [26, 20], 'light', [-6, 5.4, 0.55, 1]),
  sample(15, -104, 'tomasz', 'young', [18, 11], 'none', [9, 6, 0.85, -2], {
    note: 'Right hand, as she does in class.',
  }),
  sample(15, -30, 'tomasz', 'young', [27, 21], 'light', [-3, 5.4, 0.6, 0.8], {
    note: 'Left hand, by her own choice.',
  }),
  sample(16, -118, 'rohan', 'young', [22, 15], 'heavy', [-6, 6.6, 0.8, -3]),
  sample(17, -70, 'mairi', 'young', [30, 19], 'light', [-5, 5.2, 0.5, 0.5], { reversals: 9 }),
  sample(17, -42, 'mairi', 'young', [33, 27], 'light', [-5, 5, 0.45, 0.5], { reversals: 3 }),
  sample(17, -14, 'mairi', 'young', [36, 33], 'none', [-4, 4.8, 0.38, 0.4], { reversals: 1 }),
  sample(18, -66, 'adaeze', 'young', [32, 27], 'light', [-4, 5, 0.45, 0.6]),
  sample(21, -90, 'rohan', 'young', [24, 14], 'heavy', [5, 5.6, 0.85, 2.2]),
  sample(21, -20, 'rohan', 'young', [31, 23], 'light', [4, 5, 0.6, 1.4]),
  sample(22, -160, 'mairi', 'young', [33, 25], 'light', [-10, 4.8, 0.6, 3]),
  sample(22, -60, 'mairi', 'young', [41, 35], 'light', [-7, 4.4, 0.42, 1.2]),
  sample(23, -96, 'adaeze', 'middle', [35, 28], 'heavy', [-11, 4.2, 0.55, 1.6]),
  sample(23, -21, 'adaeze', 'middle', [44, 38], 'light', [-9, 3.9, 0.42, 0.9]),
  sample(24, -105, 'tomasz', 'young', [21, 13], 'light', [2, 5.8, 0.75, 1.4]),
  sample(24, -28, 'tomasz', 'young', [34, 27], 'light', [1, 5, 0.5, 0.7]),
  sample(26, -84, 'rohan', 'middle', [49, 40], 'heavy', [-10, 3.6, 0.5, 1.2]),
  sample(26, -18, 'rohan', 'middle', [57, 51], 'light', [-8, 3.3, 0.38, 0.8]),
  sample(27, -205, 'adaeze', 'middle', [47, 33], 'light', [-5, 2.3, 0.6, 0.6]),
  sample(28, -345, 'mairi', 'young', [30, 20], 'heavy', [3, 5, 0.75, 2]),
  sample(28, -136, 'mairi', 'middle', [38, 29], 'light', [2, 4.4, 0.6, 1.5]),
  sample(29, -128, 'tomasz', 'middle', [32, 22], 'heavy', [-6, 4.4, 0.7, 2]),
  sample(31, -30, 'adaeze', 'middle', [60, 55], 'none', [-2, 3.2, 0.3, 0.2]),
  sample(32, -27, 'rohan', 'middle', [55, 44], 'light', [12, 3.6, 0.55, 4], {
    note: 'Photographed again: on the first picture a classmate’s name could be read.',
  }),
  sample(33, -360, 'tomasz', 'middle', [46, 41], 'light', [-6, 3.6, 0.4, 0.8]),
  sample(34, -92, 'mairi', 'older', [62, 51], 'light', [-6, 3.2, 0.45, 0.9]),
  sample(34, -91, 'mairi', 'older', [70, 67], 'none', [0, 3, 0.22, 0.2], { script: 'right_to_left' }),
  sample(36, -262, 'tomasz', 'older', [48, 44], 'light', [-10, 3, 0.4, 0.5]),
  sample(37, -78, 'rohan', 'older', [46, 37], 'heavy', [-11, 3.2, 0.55, 1.4], {
    note: '11 words in the minute, joined now and then. Pain rose from 2 to 6 in ten minutes.',
  }),
  sample(37, -19, 'rohan', 'older', [50, 42], 'light', [-9, 3.1, 0.45, 1]),
  sample(40, -410, 'tomasz', 'older', [58, 41], 'heavy', [-12, 3.2, 0.65, 1.6]),
]
