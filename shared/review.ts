import type { Attention } from './attention.ts'
import type { Page } from './pages.ts'

/** The figures of the clinic lead's review; each opens the list behind it under the same id. */
export const reviewFigureIds = [
  'waiting',
  'waiting_over_target',
  'reviews_overdue',
  'notes_unsigned_24',
  'notes_unsigned_48',
  'notes_to_countersign',
  'letters_to_approve',
  'letters_failed',
  'consent_missing',
  'referrals_untriaged',
  'alerts_open',
] as const
export type ReviewFigureId = (typeof reviewFigureIds)[number]

export interface ReviewFigure {
  id: ReviewFigureId
  label: string
  count: number
  /** What the number means and the threshold in force, e.g. 'over 18 weeks'. */
  rule: string
  level: Attention | null
}

export interface TherapistLoad {
  therapistId: string | null
  therapist: string
  wte: number | null
  openCases: number
  points: number
  capacity: number | null
  reviewsOverdue: number
}

/** One bar of the waiting ribbon. */
export interface WaitingBar {
  childId: string
  name: string
  receivedOn: string
  days: number
  targetDays: number
  priority: boolean
}

export interface ReviewView {
  figures: ReviewFigure[]
  loads: TherapistLoad[]
  waiting: WaitingBar[]
  /** Longest, 90th percentile and median wait in days of those waiting; null when nobody waits. */
  waits: { median: number | null; p90: number | null; longest: number | null; n: number }
  asOf: string
}

export interface ReviewListRow {
  id: string
  title: string
  detail: string
  person: string | null
  since: string
  level: Attention
  /** Where to go, as a client path. */
  to: string
}
export type ReviewListPage = Page<ReviewListRow> & { label: string; rule: string }
