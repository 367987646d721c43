import { perGuardianPurposes, type ConsentBasis, type ConsentPurpose } from './consents.ts'
import { compareDays, type Day } from './days.ts'
import type { ParentalResponsibility } from './guardians.ts'

interface AskedConsent {
  purpose: ConsentPurpose
  basis: ConsentBasis
  expiresOn: Day | null
  /** Undefined where the form asks for none. */
  note?: string | null
}

interface ConsentingCarer {
  name: string
  parentalResponsibility: ParentalResponsibility
  email: string | null
  safeToContact: boolean
  restricted: boolean
}

export interface ConsentProblem {
  field: 'carer' | 'basis' | 'expiresOn' | 'note'
  message: string
}

/**
 * Why this consent cannot be recorded; null when it can. Who may consent differs from place to place: local law and the
 * professional code decide, and a basis other than parental responsibility is the therapist's own statement.
 */
export function consentProblem(
  asked: AskedConsent,
  carer: ConsentingCarer | null,
  today: Day,
): ConsentProblem | null {
  if (asked.expiresOn !== null && compareDays(asked.expiresOn, today) <= 0)
    return { field: 'expiresOn', message: 'The end date must be later than today' }
  if (carer?.restricted)
    return { field: 'carer', message: `No consent can be recorded from ${carer.name} at present` }
  if (perGuardianPurposes.includes(asked.purpose)) {
    if (carer === null) return { field: 'carer', message: 'Choose the carer these letters go to' }
    if (carer.email === null)
      return { field: 'carer', message: `Enter an e-mail address for ${carer.name} first` }
    if (!carer.safeToContact)
      return { field: 'carer', message: `It is marked as not safe to contact ${carer.name}` }
  }
  if (asked.basis === 'parental_responsibility') return responsibilityProblem(carer)
  if (asked.basis === 'other' && asked.note === null)
    return { field: 'note', message: 'Say on what basis the consent was given' }
  return null
}

function responsibilityProblem(carer: ConsentingCarer | null): ConsentProblem | null {
  if (carer === null) return { field: 'carer', message: 'Choose the carer who gave it' }
  if (carer.parentalResponsibility === 'unknown')
    return {
      field: 'carer',
      message: `It is not known whether ${carer.name} has parental responsibility: find out and record it first`,
    }
  if (carer.parentalResponsibility === 'no')
    return {
      field: 'carer',
      message: `${carer.name} does not have parental responsibility: ask a person who has`,
    }
  return null
}
