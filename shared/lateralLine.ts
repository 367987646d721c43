import { compareDays, type Day } from './days.ts'

/** What a row is about. Preference and skill are different things and never merged. */
export const lateralAspects = [
  'preference',
  'reaching',
  'skill',
  'foot',
  'eye_far',
  'eye_near',
  'ear',
] as const
export type LateralAspect = (typeof lateralAspects)[number]

/** Where a value points by its own rule; `middle` is "to neither side by that rule". */
export type LateralSide = 'left' | 'middle' | 'right'

export interface LateralSource {
  kind: 'questionnaire' | 'measure'
  id: string
}

/** One measure on the lateral line, −100 (left) … +100 (right). */
export interface LateralLineRow {
  id: string
  aspect: LateralAspect
  /** Rows of one track are occasions of the same measure by the same informant. */
  track: string
  /** E.g. 'Hand use in ten everyday activities'. */
  measure: string
  occasion: Day
  /** Null when the measure could not be scored. */
  value: number | null
  /** By cut-offs (questionnaires), beyond chance (reaching), interval clear of zero (skill), most tries (sides). */
  side: LateralSide | null
  /** 95 % interval around the value. */
  interval: { low: number; high: number } | null
  /** Band around zero within which the value is not beyond chance. */
  chance: { low: number; high: number } | null
  /** How much the value rests on, e.g. '9 of 10 activities answered'. */
  basis: string
  /** E.g. 'Provisional: fewer than 8 answered'. Null when nothing qualifies the value. */
  caution: string | null
  /** Published or clinic cut-offs drawn as faint bands; `inclusive` as in `CutOffSet`. */
  cutOffs: { name: string; left: number; right: number; inclusive: boolean } | null
  informant: string | null
  /** True for the newest occasion of its track; earlier ones are drawn lighter. */
  latest: boolean
  source: LateralSource
}

/** What a row opens to: from the figure down to what was seen. */
export interface LateralDetails {
  /** In words and signs, e.g. '100 × (R − L) ÷ (R + L)', with what R and L are. */
  formula: string
  /** The formula with this child's figures; null when it could not be worked out. */
  worked: string | null
  /** Raw answers or trials, in words, in the order of the form or of the trials. */
  raw: { label: string; value: string }[]
  /** Name and source of the cut-offs, chance limits or interval by which the side was told. */
  sideRule: string
  citation: string
  cautions: string[]
}

/** A row together with what it opens to. */
export interface HandProfileRow extends LateralLineRow {
  opens: LateralDetails
}

/** How a row is named in a sentence: measure, and who answered where somebody did. */
export const rowName = ({ measure, informant }: Pick<LateralLineRow, 'measure' | 'informant'>): string =>
  informant === null ? measure : `${measure} (${informant.toLowerCase()})`

const middleWords: Record<LateralAspect, string> = {
  preference: 'Mixed',
  reaching: 'Within chance',
  skill: 'No clear difference',
  foot: 'Mixed',
  eye_far: 'Mixed',
  eye_near: 'Mixed',
  ear: 'Mixed',
}

/** The value in words, by the measure's own rule. Preference and skill are told in words of their own. */
export function sideWords({
  value,
  side,
  aspect,
}: Pick<LateralLineRow, 'value' | 'side' | 'aspect'>): string {
  if (value === null) return 'Not scorable'
  if (side === null) return 'No side told'
  if (side === 'middle') return middleWords[aspect]
  const word = side === 'left' ? 'Left' : 'Right'
  return aspect === 'skill' ? `${word} hand ahead` : word
}

export interface LateralTrack<Row extends LateralLineRow = LateralLineRow> {
  id: string
  aspect: LateralAspect
  measure: string
  informant: string | null
  /** Newest first. */
  rows: Row[]
}

/**
 * One track for each measure and informant, in the order in which each first comes: what a parent said is never drawn as
 * what a teacher said.
 */
export function tracksOf<Row extends LateralLineRow>(rows: readonly Row[]): LateralTrack<Row>[] {
  const tracks = new Map<string, LateralTrack<Row>>()
  for (const row of rows) {
    const { track: id, aspect, measure, informant } = row
    const track = tracks.get(id) ?? { id, aspect, measure, informant, rows: [] }
    track.rows.push(row)
    tracks.set(id, track)
  }
  for (const track of tracks.values())
    track.rows.sort((a, b) => Number(b.latest) - Number(a.latest) || compareDays(b.occasion, a.occasion))
  return [...tracks.values()]
}

/** A row before it is known which measure of which day it belongs to; `part` is its track. */
export type MeasurePart = Omit<
  HandProfileRow,
  'id' | 'track' | 'occasion' | 'latest' | 'source' | 'informant'
> & { part: string }
