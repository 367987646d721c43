import type { RequestedForm } from '../../../shared/answerRequests.ts'
import type { ConclusionContent, EvidenceKind } from '../../../shared/conclusions.ts'
import type { HistoryDetails } from '../../../shared/histories.ts'
import type { ReachPlace, SeatingDetails, SidesDetails, SkillDetails } from '../../../shared/measures.ts'
import type { Asked, Offset, TimeOfDay } from './demoTypes.ts'
import type { StaffKey } from './people.ts'

export interface DemoHistory {
  child: number
  answeredDay: Offset
  time: TimeOfDay
  /** Place among the child's carers of the one who told it. */
  carer: number
  /** Who wrote it down, or asked for it. */
  by: StaffKey
  /** Answered signed in by that carer, who was asked on this day; null when it was told to a therapist. */
  askedDay: Offset | null
  details: Omit<HistoryDetails, 'handChangedOn' | 'injuryOn'>
  handChangedDay: Offset | null
  injuryDay: Offset | null
}

/** A request that nobody has answered so far. */
export interface DemoRequest {
  child: number
  by: StaffKey
  askedDay: Offset
  asks: RequestedForm
  formId: string | null
  of: Asked
  byLink: boolean
  /** Days on which the clinic's own reminders went out. */
  remindedDays: Offset[]
}

/** One card at a place: the hand that took it first; null when the reach was not seen. */
export interface DemoReach {
  hand: 'left' | 'right' | null
  swapped: boolean
}

/** Reaches by place; the order of the cards follows from the seed. */
export interface DemoReaching {
  kind: 'reaching'
  seed: number
  reached: Record<ReachPlace, DemoReach[]>
}

export interface DemoMeasure {
  child: number
  measuredDay: Offset
  by: StaffKey
  details: DemoReaching | SkillDetails | SidesDetails | SeatingDetails
  notDoneReason: string | null
  comment: string | null
}

export interface DemoConclusion {
  child: number
  by: StaffKey
  writtenDay: Offset
  /** Everything of these kinds that is closed on the record by then. */
  restsOn: EvidenceKind[]
  content: Omit<ConclusionContent, 'evidence'>
  /** A draft stays a draft. */
  signed: boolean
  /** For newly qualified authors; null leaves a signed one waiting, or none is needed. */
  countersigned: { day: Offset; by: StaffKey } | null
  /** Takes the place of the child's conclusion before. */
  replacesEarlier: boolean
}
