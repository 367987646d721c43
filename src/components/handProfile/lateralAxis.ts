import {
  tracksOf,
  type LateralAspect,
  type LateralDetails,
  type LateralLineRow,
  type LateralTrack,
} from '@shared/lateralLine.ts'

export type Side = 'left' | 'right' | 'neither'

/** A row of the line; where it opens down, with what it opens to. */
export type OpeningRow = LateralLineRow & { opens?: LateralDetails }

/** Where a value of −100 … +100 sits along the axis, as a percentage of its width (0 left, 100 right). */
export const axisPosition = (value: number): number =>
  Math.round(((Math.min(100, Math.max(-100, value)) + 100) / 2) * 100) / 100

/** How wide a band from one value to another is, as a percentage of the axis. */
export const axisWidth = (low: number, high: number): number =>
  Math.round((axisPosition(high) - axisPosition(low)) * 100) / 100

/** Which way the half-petal points: by sign only, so the mark never hides a value between the cut-offs. */
export const sideOf = (value: number): Side => (value < 0 ? 'left' : value > 0 ? 'right' : 'neither')

export interface LateralGroup {
  label: string
  tracks: LateralTrack<OpeningRow>[]
}

const groupsInOrder: { label: string; aspects: readonly LateralAspect[] }[] = [
  { label: 'Which hand is chosen', aspects: ['preference', 'reaching'] },
  { label: 'How well each hand does', aspects: ['skill'] },
  { label: 'Foot, eye and ear', aspects: ['foot', 'eye_far', 'eye_near', 'ear'] },
]

/** Preference, skill and the other sides, always apart and in this order; empty groups are left out. */
export const lateralGroups = (rows: readonly OpeningRow[]): LateralGroup[] => {
  const tracks = tracksOf(rows)
  return groupsInOrder
    .map(({ label, aspects }) => ({
      label,
      tracks: aspects.flatMap((aspect) => tracks.filter((track) => track.aspect === aspect)),
    }))
    .filter((group) => group.tracks.length > 0)
}

/** Where the words "within chance" stand: in the half of the band that the mark leaves free. */
export const chanceWordsAt = (chance: { low: number; high: number }, value: number | null): number =>
  axisPosition(
    value === null || value < chance.low || value > chance.high
      ? (chance.low + chance.high) / 2
      : (value <= 0 ? chance.high : chance.low) / 2,
  )
