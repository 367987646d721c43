import type { Interval, SeatingDetails, SeatingScore } from './measures.ts'

/*
 * Fit of chair and desk. Sizes: marks of EN 1729-1, read on a supplier's sizing page and on a German table that quotes the
 * 2006 edition (second hand; a 2015 edition exists: check it before ordering). Match equations: the reviews of Castellucci,
 * Arezes & Molenbroek 2014 (Appl Ergon 45:1123-1132) and 2015 (Int J Ind Ergon 48:117-126), abstracts read, equations from
 * memory. Lengths in cm unless named mm.
 */

export interface SizeMark {
  mark: number
  /** Floor to hollow of the knee, in shoes. Upper end open for the largest. */
  poplitealMm: { from: number; to: number | null }
  statureMm: { from: number; to: number }
  seatHeightMm: number
  tableHeightMm: number
  /** Figures of this row that were not read in a source. */
  fromMemory: readonly string[]
}

const row = (
  mark: number,
  popliteal: [number, number | null],
  stature: [number, number],
  [seatHeightMm, tableHeightMm]: [number, number],
  fromMemory: readonly string[] = [],
): SizeMark => ({
  mark,
  poplitealMm: { from: popliteal[0], to: popliteal[1] },
  statureMm: { from: stature[0], to: stature[1] },
  seatHeightMm,
  tableHeightMm,
  fromMemory,
})

export const sizeMarks: readonly SizeMark[] = [
  row(0, [200, 250], [800, 950], [210, 400], ['popliteal height', 'table height']),
  row(1, [250, 280], [930, 1160], [260, 460]),
  row(2, [280, 315], [1080, 1210], [310, 530]),
  row(3, [315, 355], [1190, 1420], [350, 590]),
  row(4, [355, 405], [1330, 1590], [380, 640]),
  row(5, [405, 435], [1460, 1765], [430, 710]),
  row(6, [435, 485], [1590, 1880], [460, 760]),
  row(7, [485, null], [1740, 2070], [510, 820], ['popliteal height']),
]

const holds = (value: number, { from, to }: { from: number; to: number | null }) =>
  value >= from && (to === null || value <= to)

/** Marks whose popliteal range holds this height in mm: two on a shared boundary (try both), none outside the table. */
export const marksByPopliteal = (poplitealMm: number): number[] =>
  sizeMarks.filter((size) => holds(poplitealMm, size.poplitealMm)).map(({ mark }) => mark)

/** Marks whose stature range holds this height in mm. The ranges overlap, so there may be two or three. */
export const marksByStature = (statureMm: number): number[] =>
  sizeMarks.filter((size) => holds(statureMm, size.statureMm)).map(({ mark }) => mark)

const cosine = (degrees: number) => Math.cos((degrees * Math.PI) / 180)

/** Share of the way from elbow to shoulder by which a desk may rise, for an upper arm held forward and aside (degrees). */
export const deskConstant = (flexion: number, abduction: number): number =>
  1 - cosine(flexion) + cosine(flexion) * (1 - cosine(abduction))

/** Remembered as 0.1483; flexion 25° and abduction 20° give it. */
const deskShare = 0.1483

type Measured = number | null

/** Popliteal height with its shoe: as measured when that was in shoes (`shoeCm` null). */
const poplitealInShoes = ({
  poplitealCm,
  shoeCm,
}: Pick<SeatingDetails, 'poplitealCm' | 'shoeCm'>): Measured =>
  poplitealCm === null ? null : poplitealCm + (shoeCm === null ? 0 : shoeCm)

/** (P + S) cos 30° to (P + S) cos 5°: popliteal height and shoe. */
export function seatRange(measures: Pick<SeatingDetails, 'poplitealCm' | 'shoeCm'>): Interval | null {
  const height = poplitealInShoes(measures)
  return height === null ? null : { low: height * cosine(30), high: height * cosine(5) }
}

/** 80 to 95 % of the length from buttock to hollow of the knee. */
export const depthRange = (buttockPoplitealCm: Measured): Interval | null =>
  buttockPoplitealCm === null ? null : { low: 0.8 * buttockPoplitealCm, high: 0.95 * buttockPoplitealCm }

/**
 * Seat + E to seat + 0.8517 E + 0.1483 A: elbow (E) and shoulder (A) above the seat. Null when a measure is missing or
 * the shoulder is not above the elbow.
 */
export function deskRange({
  seatHeightCm: seat,
  elbowHeightCm: elbow,
  shoulderHeightCm: shoulder,
}: Pick<SeatingDetails, 'seatHeightCm' | 'elbowHeightCm' | 'shoulderHeightCm'>): Interval | null {
  if (seat === null || elbow === null || shoulder === null || shoulder <= elbow) return null
  return { low: seat + elbow, high: seat + (1 - deskShare) * elbow + deskShare * shoulder }
}

export type Fit = 'low' | 'match' | 'high'

/** Null when anything is missing: nothing fits by default. */
export function fitOf(value: Measured, range: Interval | null): Fit | null {
  if (value === null || range === null) return null
  return value < range.low ? 'low' : value > range.high ? 'high' : 'match'
}

/** What to change, in cm to the nearer end of the range: plus is higher or longer, 0 fits, null cannot be told. */
export function changeToFit(value: Measured, range: Interval | null): number | null {
  const fit = fitOf(value, range)
  if (fit === null || value === null || range === null) return null
  return fit === 'low' ? range.low - value : fit === 'high' ? range.high - value : 0
}

/** A tenth of a millimetre, so that 25 cm and 3 cm make 280 mm and no more. */
const toMm = (cm: number) => Math.round(cm * 100) / 10

function marksOf(measures: SeatingDetails): Pick<SeatingScore, 'marks' | 'marksFrom'> {
  const height = poplitealInShoes(measures)
  if (height !== null) return { marks: marksByPopliteal(toMm(height)), marksFrom: 'popliteal' }
  if (measures.statureCm !== null)
    return { marks: marksByStature(toMm(measures.statureCm)), marksFrom: 'stature' }
  return { marks: null, marksFrom: null }
}

export function scoreSeating(measures: SeatingDetails): SeatingScore {
  const seat = seatRange(measures)
  const depth = depthRange(measures.buttockPoplitealCm)
  const desk = deskRange(measures)
  return {
    kind: 'seating',
    ...marksOf(measures),
    seatRange: seat,
    depthRange: depth,
    deskRange: desk,
    seatChange: changeToFit(measures.seatHeightCm, seat),
    depthChange: changeToFit(measures.seatDepthCm, depth),
    deskChange: changeToFit(measures.deskHeightCm, desk),
  }
}

export const seatingCautions = {
  memory:
    'The match equations are from memory; the reviews that compare them found that two common seat rules give quite different answers (Castellucci et al. 2014, 2015).',
  stature: 'Body height gives the size only roughly, and often two sizes: measure to the hollow of the knee.',
  boundary: 'The measure lies where two sizes meet: try both.',
  outside: 'The measure lies outside the table of sizes.',
  deskAfterSeat:
    'Set the seat first, then measure the desk again: the desk range goes from the present seat.',
  footrest: 'Think of a footrest before new furniture.',
  edition: 'Sizes quote the 2006 edition of EN 1729-1; a 2015 edition exists. Check it before ordering.',
} as const

/** What must be read with this score. */
export function seatingCautionsOf(score: SeatingScore): string[] {
  const { marks, marksFrom } = score
  const seatIsOff = score.seatChange !== null && score.seatChange !== 0
  return [
    ...(marks === null ? [] : [seatingCautions.edition]),
    ...(marks?.length === 0 ? [seatingCautions.outside] : []),
    ...(marksFrom === 'stature' ? [seatingCautions.stature] : []),
    ...(marksFrom === 'popliteal' && marks !== null && marks.length > 1 ? [seatingCautions.boundary] : []),
    ...(score.seatRange || score.depthRange || score.deskRange ? [seatingCautions.memory] : []),
    ...(seatIsOff ? [seatingCautions.deskAfterSeat] : []),
    ...(score.seatChange !== null && score.seatChange < 0 ? [seatingCautions.footrest] : []),
  ]
}
