import { type InferType } from 'yup'
import { optionalDayField } from './days.ts'
import { body, choice, optionalId, optionalText, text } from './fields.ts'

/** One consent record for each purpose; none implies another. */
export const consentPurposes = [
  'assessment_treatment',
  'store_work_samples',
  'email_link',
  'email_attachment',
  'share_school_seating',
  'share_school_goals',
  'share_school_samples',
  'share_school_observation',
  'share_doctor',
  'video',
  'observer_present',
  'teaching_use',
] as const
export type ConsentPurpose = (typeof consentPurposes)[number]

export const consentPurposeLabels: Record<ConsentPurpose, string> = {
  assessment_treatment: 'Assessment and therapy',
  store_work_samples: 'Keeping photographs or scans of the child’s work',
  email_link: 'Letters: an e-mail with a link that needs sign-in',
  email_attachment: 'Letters: attached to the e-mail',
  share_school_seating: 'School: seating and classroom advice',
  share_school_goals: 'School: goals in the child’s words',
  share_school_samples: 'School: handwriting samples',
  share_school_observation: 'School: what was observed',
  share_doctor: 'Sharing with the family doctor',
  video: 'Filming in a session',
  observer_present: 'A student or colleague watching',
  teaching_use: 'Use in staff teaching',
}

/** What a family loses or keeps when they say no, in plain words beside the choice. */
export const consentConsequences: Record<ConsentPurpose, string> = {
  assessment_treatment: 'Without it we cannot assess or work with your child. The record so far is kept.',
  store_work_samples: 'Without it we look at the work together and keep no picture.',
  email_link: 'Without it letters come on paper.',
  email_attachment:
    'Without it you sign in to read letters. Attached letters can be read by anyone who opens the e-mail.',
  share_school_seating:
    'Without it the school gets no advice from us. If you stop it, the teacher loses it at once.',
  share_school_goals: 'Without it the teacher does not see the goals.',
  share_school_samples: 'Without it the teacher does not see or send samples.',
  share_school_observation: 'Without it we do not ask the teacher what they see.',
  share_doctor: 'Without it we write to the doctor only where the law requires it.',
  video: 'Without it nothing is filmed.',
  observer_present: 'Without it only the therapist is present.',
  teaching_use: 'Saying no changes nothing for your child.',
}

/** E-mail consent belongs to one carer; every other purpose belongs to the child. */
export const perGuardianPurposes: readonly ConsentPurpose[] = ['email_link', 'email_attachment']

export const consentBases = [
  'parental_responsibility',
  'young_person_competent',
  'court_order',
  'other',
] as const
export type ConsentBasis = (typeof consentBases)[number]
export const consentBasisLabels: Record<ConsentBasis, string> = {
  parental_responsibility: 'Parental responsibility',
  young_person_competent: 'Young person consents for themselves',
  court_order: 'Court order',
  other: 'Other (say which)',
}

export const consentMethods = ['signed_in', 'paper', 'in_person', 'phone_witnessed'] as const
export type ConsentMethod = (typeof consentMethods)[number]
export const consentMethodLabels: Record<ConsentMethod, string> = {
  signed_in: 'Signed in',
  paper: 'On paper',
  in_person: 'In person',
  phone_witnessed: 'By phone, witnessed',
}

/** Recorded by staff; a guardian's own choice uses `guardianConsentSchema`. */
export const consentSchema = body({
  purpose: choice('a purpose', consentPurposes),
  guardianId: optionalId('The carer'),
  basis: choice('a basis', consentBases),
  method: choice('how it was given', consentMethods),
  expiresOn: optionalDayField('The end date'),
  note: optionalText('The note', { max: 500 }),
})
export type ConsentGiven = InferType<typeof consentSchema>

export const guardianConsentSchema = body({
  purpose: choice('a purpose', consentPurposes),
})

/** Stopping is as easy as agreeing: a carer need not say why. */
export const guardianWithdrawalSchema = body({
  reason: optionalText('The reason', { max: 500 }),
})

export const consentWithdrawalSchema = body({
  reason: text('The reason', { min: 2, max: 500 }),
})
export type ConsentWithdrawal = InferType<typeof consentWithdrawalSchema>

/** A consent as stored, with its withdrawal where there is one. Moments are ISO 8601 UTC. */
export interface ConsentView {
  id: string
  purpose: ConsentPurpose
  guardianId: string | null
  givenBy: string
  basis: ConsentBasis
  method: ConsentMethod
  givenAt: string
  expiresAt: string | null
  withdrawnAt: string | null
  withdrawalReason: string | null
  inForce: boolean
  note: string | null
  can: { withdraw: boolean }
}

interface ConsentTimes {
  givenAt: Date
  expiresAt: Date | null
  withdrawnAt: Date | null
}

/** In force from the moment given (inclusive) until expiry or withdrawal (exclusive). */
export const isConsentInForce = ({ givenAt, expiresAt, withdrawnAt }: ConsentTimes, at: Date) =>
  givenAt <= at && (expiresAt === null || at < expiresAt) && (withdrawnAt === null || at < withdrawnAt)
