import type { ConsentPurpose } from '../../../shared/consents.ts'
import { isOpen, type EpisodeState } from '../../../shared/episodes.ts'
import type { GuardianRelation } from '../../../shared/guardians.ts'
import type { ReferralConcern, ReferralSource } from '../../../shared/referrals.ts'
import type { DemoCarer, DemoChild, DemoConsent, DemoReferral, DemoStep, Offset } from './demoTypes.ts'
import { parentOf, parents, type ParentKey } from './parents.ts'
import type { StaffKey } from './people.ts'

const streets = [
  'Mill Lane',
  'Weir Street',
  'Cooper’s Row',
  'Orchard Road',
  'Station Hill',
  'Quay Close',
] as const

/** A telephone number and an address for each parent, from their place in the list. */
function contactOf(account: ParentKey) {
  const place = parents.findIndex(({ key }) => key === account)
  const street = streets[place % streets.length] ?? streets[0]
  return { phone: `01632 960 ${200 + place * 7}`, address: `${3 + place * 2} ${street}, Harrowmere` }
}

/** A carer with an account. Most hold parental responsibility. */
export const carer = (
  account: ParentKey,
  relation: GuardianRelation,
  changes: Partial<DemoCarer> = {},
): DemoCarer => ({
  name: parentOf(account).displayName,
  relation,
  parentalResponsibility: 'yes',
  courtOrder: false,
  safeToContact: true,
  email: parentOf(account).email,
  ...contactOf(account),
  account,
  ...changes,
})

/** A carer who does not sign in. */
export const carerWithoutAccount = (
  name: string,
  relation: GuardianRelation,
  changes: Partial<DemoCarer> = {},
): DemoCarer => ({
  name,
  relation,
  parentalResponsibility: 'yes',
  courtOrder: false,
  safeToContact: true,
  email: null,
  phone: null,
  address: null,
  account: null,
  ...changes,
})

/** One consent; on paper and entered by the administrator unless said otherwise. */
export const consent = (
  purpose: ConsentPurpose,
  givenDay: Offset,
  changes: Partial<DemoConsent> = {},
): DemoConsent => ({
  purpose,
  carer: 0,
  basis: 'parental_responsibility',
  method: 'paper',
  givenDay,
  recordedBy: 'pauline',
  expiresDay: null,
  note: null,
  withdrawn: null,
  ...changes,
})

/** What most families agree to: therapy, keeping work, letters by link, and seating advice for school. */
export const usualConsents = (givenDay: Offset, changes: Partial<DemoConsent> = {}): DemoConsent[] =>
  (['assessment_treatment', 'store_work_samples', 'email_link', 'share_school_seating'] as const).map(
    (purpose) => consent(purpose, givenDay, changes),
  )

interface ReferralParts {
  day: Offset
  source: ReferralSource
  from: [name: string, role: string | null, email: string | null, phone: string | null]
  concerns: ReferralConcern[]
  reason: string
  priorityReason?: string
}

export const referral = ({
  day,
  source,
  from,
  concerns,
  reason,
  priorityReason,
}: ReferralParts): DemoReferral => ({
  receivedDay: day,
  source,
  referrerName: from[0],
  referrerRole: from[1],
  referrerEmail: from[2],
  referrerPhone: from[3],
  reason,
  concerns,
  schoolNote: null,
  priority: priorityReason === undefined ? 'routine' : 'priority',
  priorityReason: priorityReason ?? null,
})

/** Referrals that come from the three schools. */
export const fromSchool = (school: 'larkwater' | 'thistlebank' | 'brindlemoor'): ReferralParts['from'] =>
  ({
    larkwater: ['Siobhán Delahunt', 'Class teacher', 'siobhan.delahunt@larkwater.example', '01632 960 151'],
    thistlebank: ['Kwabena Asirifi', 'Class teacher', 'kwabena.asirifi@thistlebank.example', '01632 960 152'],
    brindlemoor: ['Hye-jin Noh', 'Learning support lead', 'hye-jin.noh@brindlemoor.example', '01632 960 153'],
  })[school] as ReferralParts['from']

/** Referrals that a parent makes. */
export const fromParent = (account: ParentKey): ReferralParts['from'] => {
  const { displayName, email } = parentOf(account)
  return [displayName, null, email, contactOf(account).phone]
}

const usualReasons: Partial<Record<EpisodeState, string>> = {
  triaged: 'Read and accepted. Therapy looks useful.',
  waiting: 'Waiting for a first appointment. The family has the advice sheet.',
  consented: 'Consent for assessment received and checked.',
  assessing: 'First assessment visit.',
  formulated: 'Assessment finished and talked over with the family.',
  active: 'Block of six sessions agreed with the family.',
  review: 'Block finished. Review with the family to come.',
}

/**
 * The steps of an episode from the day each was taken. Acceptance and waiting are the lead's, the rest the therapist's
 * (the lead's while nobody holds the child). Steps that end an episode need their own reason.
 */
export function path(
  days: Partial<Record<EpisodeState, Offset>>,
  therapist: StaffKey | null,
  reasons: Partial<Record<EpisodeState, string>> = {},
): DemoStep[] {
  return (Object.entries(days) as [EpisodeState, Offset][]).map(([to, day]) => {
    const reason = reasons[to] ?? usualReasons[to]
    if (reason === undefined) throw new Error(`A step to ${to} needs a reason`)
    const byLead = therapist === null || to === 'triaged' || to === 'waiting'
    return { to, day, by: byLead ? 'ines' : therapist, reason }
  })
}

type Optional =
  'preferredName' | 'interpreterLanguage' | 'scriptDirection' | 'lookedAfter' | 'consentsForSelf'

/** A child of the scenario; what most children share is filled in. */
export const child = (
  parts: Omit<DemoChild, Optional | 'homeLanguages' | 'nextReviewDay'> &
    Partial<Pick<DemoChild, Optional | 'homeLanguages' | 'nextReviewDay'>>,
): DemoChild => ({
  preferredName: null,
  homeLanguages: 'English',
  interpreterLanguage: null,
  scriptDirection: 'ltr',
  lookedAfter: false,
  consentsForSelf: false,
  nextReviewDay: null,
  ...parts,
})

/** Where the child's episode stands in the end. */
export const stateOf = ({ steps }: Pick<DemoChild, 'steps'>): EpisodeState => steps.at(-1)?.to ?? 'referred'

export const hasOpenEpisode = (of: Pick<DemoChild, 'steps'>) => isOpen(stateOf(of))
