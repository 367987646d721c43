import type { Reach, ReachingDetails, ReachPlace } from '@shared/measures.ts'
import type { Hand } from '@shared/roles.ts'

/** Adds a reach at the place whose turn it is. `hand` null is a lost reach. */
export const addReach = (
  details: ReachingDetails,
  place: ReachPlace,
  hand: Hand | null,
): ReachingDetails => ({
  ...details,
  reaches: [...details.reaches, { place, hand, swapped: false }],
})

export const undoReach = (details: ReachingDetails): ReachingDetails => ({
  ...details,
  reaches: details.reaches.slice(0, -1),
})

export const canSwap = (last: Reach | undefined): boolean => last !== undefined && last.hand !== null

/** Marks the last reach as swapped on the way, or takes the mark away. A lost reach has no hand to swap. */
export function toggleSwap(details: ReachingDetails): ReachingDetails {
  const last = details.reaches.at(-1)
  if (last === undefined || !canSwap(last)) return details
  return { ...details, reaches: [...details.reaches.slice(0, -1), { ...last, swapped: !last.swapped }] }
}
