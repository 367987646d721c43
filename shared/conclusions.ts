import { array, boolean, type InferType } from 'yup'
import type { Day } from './days.ts'
import { body, choice, id, optionalChoice, optionalId, optionalText } from './fields.ts'
import type { LateralLineRow } from './lateralLine.ts'
import type { ClinicSettings } from './settings.ts'
import type { WordingLevel } from './wordingRules.ts'

export const conclusionStates = ['draft', 'awaiting_countersignature', 'signed'] as const
export type ConclusionState = (typeof conclusionStates)[number]
export const conclusionStateLabels: Record<ConclusionState, string> = {
  draft: 'Draft',
  awaiting_countersignature: 'Waits for countersignature',
  signed: 'Signed',
}

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
export const handPreferenceLabels: Record<HandPreference, string> = {
  left_settled: 'Left-handed, settled',
  right_settled: 'Right-handed, settled',
  left_emerging: 'Coming to prefer the left hand',
  right_emerging: 'Coming to prefer the right hand',
  mixed_steady_by_task: 'Different hands for different jobs, the same one each time',
  swaps_within_task: 'Changes hands within one job',
  possibly_switched: 'May have been asked to use the other hand',
  unclear: 'Not clear yet',
}

export const confidences = ['low', 'medium', 'high'] as const
export type Confidence = (typeof confidences)[number]
export const confidenceLabels: Record<Confidence, string> = {
  low: 'Low: more must be seen',
  medium: 'Medium: most of what was seen agrees',
  high: 'High: what was seen agrees',
}

export const conclusionPlans = ['advice', 'block', 'review_in_6_months', 'medical_review', 'no_need'] as const
export type ConclusionPlan = (typeof conclusionPlans)[number]
export const conclusionPlanLabels: Record<ConclusionPlan, string> = {
  advice: 'Advice for home and school',
  block: 'A block of therapy',
  review_in_6_months: 'A review in six months',
  medical_review: 'A medical review',
  no_need: 'Nothing more is needed now',
}

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
export const evidenceKindLabels: Record<EvidenceKind, string> = {
  questionnaire: 'Questionnaires',
  measure: 'Measures',
  history: 'History',
  writing_observation: 'Writing observed',
  sample: 'Handwriting samples',
  session_note: 'Session notes',
}

export interface EvidenceLink {
  kind: EvidenceKind
  id: string
}

/** A draft as it is saved at every pause in writing: anything may still be missing. */
export const conclusionContentSchema = body({
  handPreference: optionalChoice('the hand preference', handPreferences),
  confidence: optionalChoice('how sure you are', confidences),
  evidence: array(body({ kind: choice('the kind of evidence', evidenceKinds), id: id('The evidence') }))
    .required('The evidence is missing')
    .max(40, 'Choose at most 40 pieces of evidence'),
  strengths: optionalText('The strengths', { max: 4000 }),
  mattersToChild: optionalText('What matters to the child', { max: 2000 }),
  reasoning: optionalText('The reasoning', { max: 8000 }),
  plan: optionalChoice('the plan', conclusionPlans),
  planDetail: optionalText('The plan in words', { max: 4000 }),
  aboutDisagreements: optionalText('What you say about the disagreements', { max: 4000 }),
})

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

export const emptyConclusion: ConclusionContent = {
  handPreference: null,
  confidence: null,
  evidence: [],
  strengths: null,
  mattersToChild: null,
  reasoning: null,
  plan: null,
  planDetail: null,
  aboutDisagreements: null,
}

/** Begins a conclusion; with `replacesId` it starts from the signed text that it takes the place of. */
export const conclusionStartSchema = body({
  replacesId: optionalId('The earlier conclusion').optional(),
})
export type ConclusionStart = InferType<typeof conclusionStartSchema>

/** For the author's signature and for the countersignature: said on purpose, never by the way. */
export const signConclusionSchema = body({
  confirmed: boolean()
    .required('Confirm that you have read the conclusion and that it is about this child')
    .oneOf([true], 'Confirm that you have read the conclusion and that it is about this child'),
})
export type SignConclusion = InferType<typeof signConclusionSchema>

export interface EvidenceChoice extends EvidenceLink {
  /** E.g. 'Reaching across the midline, 3 Mar 2026: 14 left, 7 right'. */
  words: string
  on: Day
}

export const conclusionTexts = [
  'strengths',
  'mattersToChild',
  'reasoning',
  'planDetail',
  'aboutDisagreements',
] as const
export type ConclusionText = (typeof conclusionTexts)[number]
export const conclusionTextLabels: Record<ConclusionText, string> = {
  strengths: 'What goes well',
  mattersToChild: 'What matters to the child',
  reasoning: 'How the conclusion was reached',
  planDetail: 'The plan in words',
  aboutDisagreements: 'About what does not agree',
}

/** Words of a draft that stop the signature (`blocked`) or are better put another way (`discouraged`). */
export interface ConclusionFinding {
  field: ConclusionText
  level: WordingLevel
  phrase: string
  message: string
  instead: string[]
}

/** Something begun and not locked, which must be finished or discarded before the conclusion is signed. */
export interface Unfinished {
  kind: 'questionnaire' | 'measure'
  id: string
  /** E.g. 'Moving pegs, begun for 3 Mar 2026'. */
  words: string
}

/** What stands between a draft and its signature. */
export interface ConclusionCheck {
  evidenceChoices: EvidenceChoice[]
  contradictions: string[]
  /** Field and what to do, as beside the field. */
  missing: Record<string, string>
  findings: ConclusionFinding[]
  unfinished: Unfinished[]
  /** Words of the open warning signs that come first, oldest first. They stand on the record and in no report. */
  warningSigns: string[]
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

/** How the report names child, clinic and author: as they were called on the day of the signature. */
export interface ReportHead {
  childName: string
  recordNumber: string
  birthDate: Day
  author: string
  clinic: Pick<ClinicSettings, 'clinicName' | 'clinicAddress' | 'clinicPhone' | 'timeZone'>
}

/** What is kept at signing, so that the report is the same whenever it is opened. */
export interface SignedEvidence extends ConclusionEvidence {
  head: ReportHead
  /** What must stand beside the figures. */
  cautions: string[]
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
