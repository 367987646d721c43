import { attentionLevels, type Attention } from '../../shared/attention.ts'
import { caseloadCapacity, caseloadPoints, noAddedWork } from '../../shared/caseloadWeights.ts'
import { compareDays, type Day } from '../../shared/days.ts'
import {
  reviewFigureIds,
  type ReviewFigure,
  type ReviewFigureId,
  type ReviewView,
  type TherapistLoad,
} from '../../shared/review.ts'
import { reviewFigureTexts } from '../../shared/reviewFigures.ts'
import { summariseWaits, waitDays } from '../../shared/waits.ts'
import type { LoadedTherapistRow, OpenCaseRow, WaitingRow } from '../queries/review.ts'
import type { WorkClock } from './workItems.ts'

/** How pressing a figure is once it is not nought; null says only how many. */
const levels: Record<ReviewFigureId, Attention | null> = {
  waiting: null,
  waiting_over_target: 'overdue',
  reviews_overdue: 'overdue',
  notes_unsigned_24: 'due',
  notes_unsigned_48: 'overdue',
  notes_to_countersign: 'due',
  letters_to_approve: 'due',
  letters_failed: 'overdue',
  consent_missing: 'due',
  referrals_untriaged: 'overdue',
  alerts_open: 'overdue',
}

export interface ReviewFacts {
  counts: Record<ReviewFigureId, number>
  waiting: readonly WaitingRow[]
  cases: readonly OpenCaseRow[]
  therapists: readonly LoadedTherapistRow[]
}

/** The most pressing first, then in the order of the list. */
const presentFigures = (counts: ReviewFacts['counts'], clock: WorkClock): ReviewFigure[] => {
  const texts = reviewFigureTexts(clock.settings)
  const pressing = (id: ReviewFigureId) => {
    const level = levels[id]
    return counts[id] > 0 && level !== null ? attentionLevels.indexOf(level) : -1
  }
  return reviewFigureIds
    .toSorted((a, b) => pressing(b) - pressing(a))
    .map((id) => ({ id, count: counts[id], level: counts[id] > 0 ? levels[id] : null, ...texts[id] }))
}

const presentLoad = (
  therapist: LoadedTherapistRow | null,
  cases: readonly OpenCaseRow[],
  today: Day,
): TherapistLoad => ({
  therapistId: therapist?.id ?? null,
  therapist: therapist?.displayName ?? 'Nobody yet',
  wte: therapist?.wte ?? null,
  openCases: cases.length,
  points: cases.reduce(
    (sum, one) => sum + caseloadPoints(one.state, { ...noAddedWork, ...addedWork(one) }),
    0,
  ),
  capacity: caseloadCapacity(therapist?.wte ?? null),
  reviewsOverdue: cases.filter((one) => one.nextReviewOn !== null && compareDays(one.nextReviewOn, today) < 0)
    .length,
})

const addedWork = ({ interpreter, twoHouseholds, safeguarding }: OpenCaseRow) => ({
  interpreter,
  twoHouseholds,
  safeguarding,
})

export const presentReview = (
  { counts, waiting, cases, therapists }: ReviewFacts,
  clock: WorkClock,
): ReviewView => {
  const targetDays = clock.settings.waitTargetWeeks * 7
  const bars = waiting.map(({ childId, name, receivedOn, priority }) => ({
    childId,
    name,
    receivedOn,
    days: waitDays(receivedOn, clock.today),
    targetDays,
    priority,
  }))
  const unallocated = cases.filter((one) => one.therapistId === null)
  return {
    figures: presentFigures(counts, clock),
    loads: [
      ...therapists.map((therapist) =>
        presentLoad(
          therapist,
          cases.filter((one) => one.therapistId === therapist.id),
          clock.today,
        ),
      ),
      ...(unallocated.length > 0 ? [presentLoad(null, unallocated, clock.today)] : []),
    ],
    waiting: bars,
    waits: summariseWaits(bars.map((bar) => bar.days)),
    asOf: clock.now.toISOString(),
  }
}
