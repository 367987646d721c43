import { directionOf, handUseDirectionLabels } from '@shared/handUse.ts'
import type { LateralLineRow } from '@shared/lateralLine.ts'

export type Side = 'left' | 'right' | 'neither'

/** Where a value of −100 … +100 sits along the axis, as a percentage of its width (0 left, 100 right). */
export const axisPosition = (value: number): number =>
  Math.round(((Math.min(100, Math.max(-100, value)) + 100) / 2) * 100) / 100

/** Which way the half-petal points: by sign only, so the mark never hides a value between the cut-offs. */
export const sideOf = (value: number): Side => (value < 0 ? 'left' : value > 0 ? 'right' : 'neither')

/** The value in words: by the measure's own cut-offs where it has them, else by side alone. */
export function sideWords(row: Pick<LateralLineRow, 'value' | 'cutOffs'>): string {
  if (row.value === null) return 'Not scorable'
  if (row.cutOffs) return handUseDirectionLabels[directionOf(row.value, row.cutOffs)]
  return { left: 'To the left', right: 'To the right', neither: 'Neither side' }[sideOf(row.value)]
}

export interface LateralTrack {
  id: string
  measure: string
  informant: string | null
  /** Newest first. */
  rows: LateralLineRow[]
}

/** One track for each measure and informant: what a parent said is never drawn as what a teacher said. */
export function tracksOf(rows: readonly LateralLineRow[]): LateralTrack[] {
  const tracks = new Map<string, LateralTrack>()
  for (const row of rows) {
    const key = `${row.measure}|${row.informant ?? ''}`
    const track = tracks.get(key) ?? { id: key, measure: row.measure, informant: row.informant, rows: [] }
    track.rows.push(row)
    tracks.set(key, track)
  }
  for (const track of tracks.values()) track.rows.sort((a, b) => b.occasion.localeCompare(a.occasion))
  return [...tracks.values()]
}
