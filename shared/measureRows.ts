import { compareDays, type Day } from './days.ts'
import type { HandProfileRow, MeasurePart } from './lateralLine.ts'
import type { MeasureDetails, MeasureScore } from './measures.ts'
import { reachingRow } from './reachingRow.ts'
import { sidesRows } from './sidesRows.ts'
import { skillRow } from './skillRow.ts'

/** A locked measure that no later one replaces. */
export interface LockedMeasure {
  id: string
  measuredOn: Day
  lockedAt: string
  details: MeasureDetails
  score: MeasureScore
  notDoneReason: string | null
}

function rowsOf({ details, score, notDoneReason }: LockedMeasure): MeasurePart[] {
  if (notDoneReason !== null) return []
  if (details.kind === 'reaching' && score.kind === 'reaching') return [reachingRow(details, score)]
  if (details.kind === 'sides' && score.kind === 'sides') return sidesRows(details, score)
  if (
    (details.kind === 'pegs' || details.kind === 'tapping' || details.kind === 'dots') &&
    (score.kind === 'pegs' || score.kind === 'tapping' || score.kind === 'dots')
  )
    return [skillRow(details, score)]
  return []
}

/**
 * Rows of the lateral line for measures, newest first. Seating has none, and a part that was not done has none either:
 * its reason stands with the measure.
 */
export function measureRows(measures: readonly LockedMeasure[]): HandProfileRow[] {
  const seen = new Set<string>()
  const newestFirst = measures.toSorted(
    (a, b) => compareDays(b.measuredOn, a.measuredOn) || (a.lockedAt < b.lockedAt ? 1 : -1),
  )
  return newestFirst.flatMap((measure) =>
    rowsOf(measure).map(({ part, ...row }) => {
      const latest = !seen.has(part)
      seen.add(part)
      return {
        ...row,
        id: part === measure.details.kind ? measure.id : `${measure.id}:${part}`,
        track: part,
        occasion: measure.measuredOn,
        informant: null,
        latest,
        source: { kind: 'measure' as const, id: measure.id },
      }
    }),
  )
}
