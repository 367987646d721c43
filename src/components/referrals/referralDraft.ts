import type { Day } from '@shared/days.ts'
import type { GuardianDetails, GuardianRelation, ParentalResponsibility } from '@shared/guardians.ts'
import type { ReferralDetails, ReferralSource, ScriptDirection } from '@shared/referrals.ts'

/** A carer while the form is being filled: a choice not yet made is null, never a guess. */
export type CarerDraft = Omit<GuardianDetails, 'relation' | 'parentalResponsibility'> & {
  relation: GuardianRelation | null
  parentalResponsibility: ParentalResponsibility | null
}

/** A referral while the form is being filled. */
export type ReferralDraft = Omit<ReferralDetails, 'source' | 'scriptDirection' | 'birthDate' | 'carers'> & {
  source: ReferralSource | null
  scriptDirection: ScriptDirection | null
  birthDate: Day | null
  carers: CarerDraft[]
}

export const emptyCarer = (): CarerDraft => ({
  name: '',
  relation: null,
  parentalResponsibility: null,
  courtOrder: false,
  safeToContact: true,
  email: null,
  phone: null,
  address: null,
})

export const emptyReferral = (today: Day): ReferralDraft => ({
  receivedOn: today,
  source: null,
  referrerName: '',
  referrerRole: null,
  referrerEmail: null,
  referrerPhone: null,
  reason: '',
  concerns: [],
  givenName: '',
  familyName: '',
  preferredName: null,
  birthDate: null,
  homeLanguages: null,
  interpreterLanguage: null,
  scriptDirection: 'ltr',
  classId: null,
  schoolNote: null,
  lookedAfter: false,
  carers: [emptyCarer()],
})
