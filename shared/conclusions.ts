import type { Day } from './days.ts'
import type { LateralLineRow } from './lateralLine.ts'

export const conclusionStates = ['draft', 'awaiting_countersignature', 'signed'] as const
export type ConclusionState = (typeof conclusionStates)[number]

export const handPreferences = [
  'left_settled',
  'right_settled',
  'left_emerging',
  'right_emerging',
  'mixed_steady_by_task',
  'swaps_within_task',
  'possibly_switched',
  'unclear',
] as const
export type HandPreference = (typeof handPreferences)[number]

export const confidences = ['low', 'medium', 'high'] as const
export type Confidence = (typeof confidences)[number]

export const conclusionPlans = ['advice', 'block', 'review_in_6_months', 'medical_review', 'no_need'] as const
export type ConclusionPlan = (typeof conclusionPlans)[number]

/** What a conclusion may rest on. */
export const evidenceKinds = [
  'questionnaire',
  'measure',
  'history',
  'writing_observation',
  'sample',
  'session_note',
] as const
export type EvidenceKind = (typeof evidenceKinds)[number]

export interface EvidenceLink {
  kind: EvidenceKind
  id: string
}

/** The therapist's own words. Null is "not written yet". */
export interface ConclusionContent {
  handPreference: HandPreference | null
  confidence: Confidence | null
  evidence: EvidenceLink[]
  strengths: string | null
  mattersToChild: string | null
  reasoning: string | null
  plan: ConclusionPlan | null
  planDetail: string | null
  /** What the therapist says about the disagreements listed before signing. */
  aboutDisagreements: string | null
}

export interface EvidenceChoice extends EvidenceLink {
  /** E.g. 'Reaching across the midline, 3 Mar 2026: 14 left, 7 right'. */
  words: string
  on: Day
}

/** As it stood when signed. */
export interface ConclusionEvidence {
  age: string
  lateralLine: LateralLineRow[]
  evidence: EvidenceChoice[]
  contradictions: string[]
  statements: string[]
  citations: string[]
}

export interface ConclusionView {
  id: string
  childId: string
  author: string
  state: ConclusionState
  content: ConclusionContent
  evidence: ConclusionEvidence | null
  signedAt: string | null
  countersignedAt: string | null
  countersignedBy: string | null
  replacesId: string | null
  replacedById: string | null
  version: number
  can: {
    change: boolean
    sign: boolean
    countersign: boolean
    replace: boolean
    discard: boolean
    report: boolean
  }
}
