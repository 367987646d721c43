import type { EpisodeState } from './episodes.ts'

/*
 * Caseload points: a rough measure of work, because equal numbers of children are not equal amounts of it. The idea of
 * points is published (Kolehmainen et al. 2010; Davidson & Bressler 2010, caseload by points); these numbers are this
 * clinic's own and thin on evidence. They compare a person's load with their hours, never one therapist with another.
 */

/** Points of one child by where the episode stands; a closed episode is no work. */
const statePoints: Partial<Record<EpisodeState, number>> = {
  referred: 0.25,
  triaged: 0.25,
  waiting: 0.25,
  consented: 0.25,
  assessing: 2,
  formulated: 2,
  active: 3,
  review: 1,
  advice_only: 0.5,
}

/** What makes the same state more work, one point each. What is not known is not counted. */
export interface AddedWork {
  interpreter: boolean
  twoHouseholds: boolean
  monthlySchoolVisits: boolean
  safeguarding: boolean
  supervisesLearner: boolean
}

export const noAddedWork: AddedWork = {
  interpreter: false,
  twoHouseholds: false,
  monthlySchoolVisits: false,
  safeguarding: false,
  supervisesLearner: false,
}

/** No child counts for more than this. */
export const mostPoints = 6

/** Points of one child; 0 only for a closed episode. */
export function caseloadPoints(state: EpisodeState, added: AddedWork = noAddedWork): number {
  const base = statePoints[state]
  if (base === undefined) return 0
  const extra = Object.values(added).filter(Boolean).length
  return Math.min(base + extra, mostPoints)
}

/** Points a full-time therapist can carry. */
export const fullTimePoints = 40

/** Capacity in points for the share of full-time hours (WTE); null when the hours are not known. */
export const caseloadCapacity = (wte: number | null): number | null =>
  wte === null ? null : wte * fullTimePoints
