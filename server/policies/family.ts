import { perGuardianPurposes, type ConsentPurpose } from '../../shared/consents.ts'
import type { GuardianRelation, ParentalResponsibility } from '../../shared/guardians.ts'
import type { DeliveryState, LetterState } from '../../shared/letters.ts'
import { childPolicy, rolePolicy } from './policy.ts'

export const familyPolicies = {
  children: rolePolicy('family.children', ['guardian'], 'read'),
  child: childPolicy('family.child', ['guardian'], 'read'),
  changeContact: childPolicy('family.contact', ['guardian'], 'write'),
  giveConsent: childPolicy('family.giveConsent', ['guardian'], 'write'),
  withdrawConsent: childPolicy('family.withdrawConsent', ['guardian'], 'write'),
  // No child stands in these addresses: the queries look within the viewer's own links only.
  letter: rolePolicy('family.letter', ['guardian'], 'read'),
  letterPdf: rolePolicy('family.letterPdf', ['guardian'], 'read'),
  delivery: rolePolicy('family.delivery', ['guardian'], 'read'),
}

/** A carer as far as deciding for the child goes. */
export interface FamilyStanding {
  guardianId: string
  relation: GuardianRelation
  parentalResponsibility: ParentalResponsibility
  /** The young person consents for themselves. */
  consentsForSelf: boolean
}

/** Those with parental responsibility speak for the child, until the young person does so themselves. */
const speaksForChild = ({ relation, parentalResponsibility, consentsForSelf }: FamilyStanding) =>
  consentsForSelf ? relation === 'self' : parentalResponsibility === 'yes'

export const mayGiveConsent = (standing: FamilyStanding): boolean => speaksForChild(standing)

/**
 * E-mail consent belongs to the carer it was given for. Of the others, whoever speaks for the child may stop each of
 * them; a carer without that right only what they once gave themselves.
 */
export const mayWithdrawConsent = (
  standing: FamilyStanding,
  consent: { guardianId: string | null; purpose: ConsentPurpose },
): boolean => {
  const own = consent.guardianId === standing.guardianId
  if (perGuardianPurposes.includes(consent.purpose)) return own
  return speaksForChild(standing) || (own && !standing.consentsForSelf)
}

interface LinkStanding {
  state: DeliveryState
  letterState: LetterState
  linkEndsAt: Date
}

/** A link of an e-mail ends after its days (end exclusive), and when the letter was recalled or its sending cancelled. */
export const isLinkOver = ({ state, letterState, linkEndsAt }: LinkStanding, at: Date): boolean =>
  at >= linkEndsAt || state === 'cancelled' || letterState === 'recalled'

/** Until the e-mail has left there is nothing to open. */
export const isLinkOpen = ({ state }: Pick<LinkStanding, 'state'>): boolean =>
  state === 'sent' || state === 'opened'
