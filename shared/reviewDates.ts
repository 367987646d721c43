import { addWeeks, type Day } from './days.ts'
import { isOpen, type EpisodeState } from './episodes.ts'

interface ReviewStep {
  from: EpisodeState
  to: EpisodeState
  nextReviewOn: Day | null
  today: Day
  /** The clinic's interval. */
  reviewWeeks: number
}

/**
 * The next review once an episode has moved on (clinic rule): a closed episode has none, a new block after a review
 * counts from today, and a child in therapy or in review is never without a date. Otherwise it stays.
 */
export function reviewDateAfter({ from, to, nextReviewOn, today, reviewWeeks }: ReviewStep): Day | null {
  if (!isOpen(to)) return null
  if (from === 'review' && to === 'active') return addWeeks(today, reviewWeeks)
  const needsDate = to === 'active' || to === 'review'
  return nextReviewOn === null && needsDate ? addWeeks(today, reviewWeeks) : nextReviewOn
}
