import type { GuardianDetails } from '../../shared/guardians.ts'
import type { AcceptReferral, ReferralDetails, ReferralView } from '../../shared/referrals.ts'
import type { Client } from './app.ts'

export const carerDetails = (given: Partial<GuardianDetails> = {}): GuardianDetails => ({
  name: 'Rosalind Quayle',
  relation: 'mother',
  parentalResponsibility: 'yes',
  courtOrder: false,
  safeToContact: true,
  email: 'rosalind@quayle.example',
  phone: '01632 960001',
  address: null,
  ...given,
})

/** A complete referral without warning signs, for a child of its own name. */
export const referralDetails = (given: Partial<ReferralDetails> = {}): ReferralDetails => ({
  receivedOn: '2026-11-02',
  source: 'school',
  referrerName: 'Marta Ibsen',
  referrerRole: 'Class teacher',
  referrerEmail: null,
  referrerPhone: null,
  reason: 'Finds it hard to keep up when copying from the board and would like to write more.',
  concerns: ['handwriting', 'speed'],
  givenName: 'Ottoline',
  familyName: 'Quayle',
  preferredName: null,
  birthDate: '2018-05-04',
  homeLanguages: 'English',
  interpreterLanguage: null,
  scriptDirection: 'ltr',
  classId: null,
  schoolNote: 'Ashbank Primary, Year 4',
  lookedAfter: false,
  carers: [carerDetails()],
  ...given,
})

export const decision = (given: Partial<AcceptReferral> = {}): AcceptReferral => ({
  priority: 'routine',
  priorityReason: null,
  therapistId: null,
  existingChildId: null,
  differentChild: false,
  consents: [],
  ...given,
})

/** Enters a referral over HTTP and answers it as the one who entered it sees it. */
export const enterReferral = async (
  who: Client,
  given: Partial<ReferralDetails> = {},
): Promise<ReferralView> => {
  const response = await who.post('/api/referrals').send(referralDetails(given))
  if (response.status !== 201)
    throw new Error(`Not entered: ${response.status} ${JSON.stringify(response.body)}`)
  return response.body as ReferralView
}

export const accept = (
  who: Client,
  referral: Pick<ReferralView, 'id' | 'version'>,
  given: Partial<AcceptReferral> = {},
) =>
  who
    .post(`/api/referrals/${referral.id}/accept`)
    .set('If-Match', `"${referral.version}"`)
    .send(decision(given))
