import type { Day } from '@shared/days.ts'
import {
  guardianRelationLabels,
  guardianRelations,
  type GuardianDetails,
  type GuardianRelation,
  type ParentalResponsibility,
} from '@shared/guardians.ts'
import {
  referralConcernLabels,
  referralSourceLabels,
  scriptDirectionLabels,
  type ReferralDetails,
  type ReferralSource,
  type ScriptDirection,
} from '@shared/referrals.ts'
import type { ClassChoice } from '@shared/schools.ts'

/** A carer while the form is being filled: a choice not yet made is null, never a guess. */
export type CarerDraft = Omit<GuardianDetails, 'relation' | 'parentalResponsibility'> & {
  relation: GuardianRelation | null
  parentalResponsibility: ParentalResponsibility | null
}

/** A referral while the form is being filled. */
export type ReferralDraft = Omit<
  ReferralDetails,
  'source' | 'scriptDirection' | 'birthDate' | 'receivedOn' | 'carers'
> & {
  receivedOn: Day | null
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

/** The carers as far as it matters for what is missing: an answer not given yet is not known. */
export const draftCarers = ({ carers }: Pick<ReferralDraft, 'carers'>) =>
  carers.map((carer) => ({ parentalResponsibility: carer.parentalResponsibility ?? ('unknown' as const) }))

/** A stored referral as the form opens it. Named one by one: the schema refuses what the view carries besides. */
export const draftOf = (referral: ReferralDetails): ReferralDraft => ({
  receivedOn: referral.receivedOn,
  source: referral.source,
  referrerName: referral.referrerName,
  referrerRole: referral.referrerRole,
  referrerEmail: referral.referrerEmail,
  referrerPhone: referral.referrerPhone,
  reason: referral.reason,
  concerns: [...referral.concerns],
  givenName: referral.givenName,
  familyName: referral.familyName,
  preferredName: referral.preferredName,
  birthDate: referral.birthDate,
  homeLanguages: referral.homeLanguages,
  interpreterLanguage: referral.interpreterLanguage,
  scriptDirection: referral.scriptDirection,
  classId: referral.classId,
  schoolNote: referral.schoolNote,
  lookedAfter: referral.lookedAfter,
  carers: referral.carers.map((carer) => ({
    name: carer.name,
    relation: carer.relation,
    parentalResponsibility: carer.parentalResponsibility,
    courtOrder: carer.courtOrder,
    safeToContact: carer.safeToContact,
    email: carer.email,
    phone: carer.phone,
    address: carer.address,
  })),
})

/** Names of the fields where two versions of a referral are compared. */
export const referralLabels: Partial<Record<keyof ReferralDraft, string>> = {
  receivedOn: 'Date received',
  source: 'Who refers',
  referrerName: 'Referrer’s name',
  referrerRole: 'Referrer’s role',
  referrerEmail: 'Referrer’s e-mail address',
  referrerPhone: 'Referrer’s phone',
  givenName: 'Given name',
  familyName: 'Family name',
  preferredName: 'Preferred name',
  birthDate: 'Date of birth',
  classId: 'School class',
  schoolNote: 'School, in words',
  homeLanguages: 'Home languages',
  interpreterLanguage: 'Interpreter needed for',
  scriptDirection: 'Direction the child writes',
  lookedAfter: 'Looked after by a local authority',
  reason: 'Reason',
  concerns: 'What it is about',
  carers: 'Parents and carers',
}

/** Says which carer an error in the summary is about. */
export const carerErrorLabels = (errors: Record<string, string>): Record<string, string> =>
  Object.fromEntries(
    Object.keys(errors).flatMap((path) => {
      const position = /^carers\[(\d)\]/.exec(path)?.[1]
      return position === undefined ? [] : [[path, `Carer ${Number(position) + 1}`]]
    }),
  )

const codes: Record<string, string> = {
  ...referralSourceLabels,
  ...referralConcernLabels,
  ...scriptDirectionLabels,
}

const labelOfRelation = (value: unknown): string | undefined =>
  guardianRelations.flatMap((relation) => (relation === value ? [guardianRelationLabels[relation]] : []))[0]

/** The words for what is stored as a code, where two versions of a referral are compared. */
export const sayReferral =
  (classes: readonly ClassChoice[]) =>
  (name: keyof ReferralDraft, value: unknown): string | undefined => {
    if (name === 'classId') return classes.find(({ id }) => id === value)?.label
    if (name === 'carers') return value === 'unknown' ? 'not known' : labelOfRelation(value)
    const coded = name === 'source' || name === 'concerns' || name === 'scriptDirection'
    return coded && typeof value === 'string' ? codes[value] : undefined
  }
