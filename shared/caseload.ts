import type { Attention } from './attention.ts'
import type { WritingHand } from './children.ts'
import type { Day } from './days.ts'
import type { EpisodeState } from './episodes.ts'
import type { Page } from './pages.ts'

/** Something that waits for the therapist, in words, with how pressing it is. */
export interface CaseloadNeed {
  kind: CaseloadNeedKind
  text: string
  level: Attention
}

export const caseloadNeedKinds = [
  'review',
  'unsigned_note',
  'countersign',
  'letter_draft',
  'letter_approval',
  'letter_failed',
  'consent',
  'task',
  'wait',
] as const
export type CaseloadNeedKind = (typeof caseloadNeedKinds)[number]

export interface CaseloadRow {
  id: string
  recordNumber: string
  name: string
  birthDate: Day
  age: string
  school: string | null
  className: string | null
  state: EpisodeState
  writingHand: WritingHand | null
  therapist: string | null
  nextReviewOn: Day | null
  lastSeenOn: Day | null
  waitingDays: number | null
  needs: CaseloadNeed[]
}
export type CaseloadPage = Page<CaseloadRow>

export const caseloadSorts = [
  'name',
  'age',
  'state',
  'school',
  'nextReviewOn',
  'lastSeenOn',
  'therapist',
] as const
export type CaseloadSort = (typeof caseloadSorts)[number]

export const caseloadFilters = ['open', 'closed', 'all'] as const
export type CaseloadFilter = (typeof caseloadFilters)[number]
