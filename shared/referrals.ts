import { array, boolean, type InferType } from 'yup'
import { consentBases, consentMethods, consentPurposes } from './consents.ts'
import { dayField, optionalDayField, type Day } from './days.ts'
import {
  body,
  choice,
  choices,
  optionalEmail,
  optionalId,
  optionalPhone,
  optionalText,
  text,
} from './fields.ts'
import { guardianSchema, type GuardianDetails } from './guardians.ts'
import type { Page } from './pages.ts'

export const referralSources = [
  'parent',
  'school',
  'family_doctor',
  'paediatrician',
  'health_visitor',
  'other_therapist',
] as const
export type ReferralSource = (typeof referralSources)[number]
export const referralSourceLabels: Record<ReferralSource, string> = {
  parent: 'Parent or carer',
  school: 'School',
  family_doctor: 'Family doctor',
  paediatrician: 'Paediatrician',
  health_visitor: 'Health visitor',
  other_therapist: 'Another therapist',
}

export const referralConcerns = [
  'hand_preference_unclear',
  'handwriting',
  'speed',
  'pain_fatigue',
  'scissors_tools',
  'self_care',
  'seating',
  'pressure_to_switch',
  'other',
] as const
export type ReferralConcern = (typeof referralConcerns)[number]
export const referralConcernLabels: Record<ReferralConcern, string> = {
  hand_preference_unclear: 'Hand preference not clear',
  handwriting: 'Handwriting',
  speed: 'Writing speed',
  pain_fatigue: 'Pain or tiredness when writing',
  scissors_tools: 'Scissors and tools',
  self_care: 'Dressing, eating and other self-care',
  seating: 'Where and how the child sits',
  pressure_to_switch: 'Pressure to use the other hand',
  other: 'Something else',
}

export const scriptDirections = ['ltr', 'rtl', 'both'] as const
export type ScriptDirection = (typeof scriptDirections)[number]
export const scriptDirectionLabels: Record<ScriptDirection, string> = {
  ltr: 'Left to right',
  rtl: 'Right to left',
  both: 'Both directions',
}

export const referralSchema = body({
  receivedOn: dayField('The date received'),
  source: choice('who referred', referralSources),
  referrerName: text('The referrer’s name', { min: 2, max: 120 }),
  referrerRole: optionalText('The referrer’s role', { max: 120 }),
  referrerEmail: optionalEmail('The referrer’s e-mail'),
  referrerPhone: optionalPhone('The referrer’s phone'),
  reason: text('The reason for referral', { min: 20, max: 2000 }),
  concerns: choices('the concerns', referralConcerns).min(1, 'Choose at least one concern'),
  givenName: text('The given name', { max: 80 }),
  familyName: text('The family name', { max: 80 }),
  preferredName: optionalText('The preferred name', { max: 80 }),
  birthDate: dayField('The date of birth'),
  homeLanguages: optionalText('Home languages', { max: 120 }),
  interpreterLanguage: optionalText('The interpreter’s language', { max: 60 }),
  scriptDirection: choice('the direction of writing', scriptDirections),
  classId: optionalId('The class'),
  schoolNote: optionalText('School and class', { max: 200 }),
  lookedAfter: boolean().required(),
  carers: array(guardianSchema).required().max(6, 'Six carers at most'),
})
export type ReferralDetails = InferType<typeof referralSchema>

export const referralStatuses = ['incomplete', 'new', 'accepted', 'merged', 'declined'] as const
export type ReferralStatus = (typeof referralStatuses)[number]
export const referralStatusLabels: Record<ReferralStatus, string> = {
  incomplete: 'Incomplete',
  new: 'To be looked at',
  accepted: 'Accepted',
  merged: 'Joined to an earlier referral',
  declined: 'Declined',
}

/** What still keeps a referral from being accepted, in words; empty when nothing does. */
export const missingFromReferral = (referral: {
  carers: readonly Pick<GuardianDetails, 'parentalResponsibility'>[]
  classId: string | null
  schoolNote: string | null
}): string[] => {
  const missing: string[] = []
  if (referral.carers.length === 0) missing.push('no carer is named')
  else if (!referral.carers.some((carer) => carer.parentalResponsibility === 'yes'))
    missing.push('nobody with parental responsibility is named')
  if (referral.classId === null && referral.schoolNote === null) missing.push('no school is named')
  return missing
}

const acceptedConsent = body({
  purpose: choice('a purpose', consentPurposes),
  /** Position of the carer in the referral's list. */
  carer: choice('the carer', ['0', '1', '2', '3', '4', '5']),
  basis: choice('a basis', consentBases),
  method: choice('how it was given', consentMethods),
  expiresOn: optionalDayField('The end date'),
})

export const priorities = ['routine', 'priority'] as const
export type Priority = (typeof priorities)[number]

export const acceptReferralSchema = body({
  priority: choice('routine or priority', priorities),
  priorityReason: optionalText('The reason for priority', { max: 500 }),
  therapistId: optionalId('The therapist'),
  /** A child already known whom this referral is about; null makes a new record. */
  existingChildId: optionalId('The child'),
  /** Must be true when a child of the same name and birth date is known and a new record is wanted all the same. */
  differentChild: boolean().required(),
  consents: array(acceptedConsent).required().max(40),
})
export type AcceptReferral = InferType<typeof acceptReferralSchema>

export const declineReferralSchema = body({
  outcome: choice('what happens instead', ['advice_only', 'redirected', 'declined'] as const),
  reason: text('The reason', { min: 10, max: 1000 }),
})
export type DeclineReferral = InferType<typeof declineReferralSchema>

export interface ReferralRow {
  id: string
  receivedOn: Day
  source: ReferralSource
  status: ReferralStatus
  priority: Priority | null
  /** Null where the viewer sees the queue without names: a therapist, until the child is theirs. */
  childName: string | null
  birthDate: Day | null
  /** E.g. '6 to 7 years': what the queue shows in place of name and birth date. */
  ageBand: string
  school: string | null
  concerns: ReferralConcern[]
  missing: string[]
  waitingDays: number
}
export type ReferralPage = Page<ReferralRow>

/** A child or open referral with the same name and birth date. */
export interface PossibleDuplicate {
  kind: 'child' | 'referral'
  id: string
  recordNumber: string | null
  name: string
  birthDate: Day
  status: string
}

/** A referral whole. Its warning signs are read from it on the page and on acceptance (shared/referralFlags.ts). */
export interface ReferralView extends ReferralDetails {
  id: string
  status: ReferralStatus
  school: string | null
  className: string | null
  missing: string[]
  duplicates: PossibleDuplicate[]
  childId: string | null
  recordNumber: string | null
  decidedBy: string | null
  decidedAt: string | null
  decisionReason: string | null
  /** What happened instead, when it was not accepted. */
  outcome: DeclineReferral['outcome'] | null
  version: number
  can: { change: boolean; accept: boolean; decline: boolean; allocate: boolean }
}
