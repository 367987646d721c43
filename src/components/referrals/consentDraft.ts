import {
  consentPurposes,
  perGuardianPurposes,
  type ConsentBasis,
  type ConsentMethod,
  type ConsentPurpose,
} from '@shared/consents.ts'
import type { GuardianDetails } from '@shared/guardians.ts'
import type { AcceptReferral } from '@shared/referrals.ts'

/** A consent while the decision is being filled in: nothing is assumed about who gave it or how. */
export interface ConsentDraft {
  purpose: ConsentPurpose
  carer: AcceptReferral['consents'][number]['carer'] | null
  basis: ConsentBasis | null
  method: ConsentMethod | null
  expiresOn: string | null
}

/** A line one may tick: a purpose, and for e-mail the carer it belongs to. */
export interface ConsentLine {
  key: string
  purpose: ConsentPurpose
  /** Position of the carer this line belongs to; null where the carer is chosen. */
  carer: ConsentDraft['carer']
}

/** How a carer is named in the decision: by position in the referral's list. */
export const carerPositions = ['0', '1', '2', '3', '4', '5'] as const

/** One line for each purpose; e-mail belongs to one carer, so there it is one line for each carer with an address. */
export const consentLines = (carers: readonly Pick<GuardianDetails, 'email'>[]): ConsentLine[] =>
  consentPurposes.flatMap((purpose): ConsentLine[] => {
    if (!perGuardianPurposes.includes(purpose)) return [{ key: purpose, purpose, carer: null }]
    return carers.flatMap((carer, index) => {
      const position = carerPositions[index]
      return carer.email === null || position === undefined
        ? []
        : [{ key: `${purpose}-${position}`, purpose, carer: position }]
    })
  })

/** Where a line's consent stands in the list; -1 when it is not given. */
export const positionOf = (consents: readonly ConsentDraft[], line: ConsentLine): number =>
  consents.findIndex(
    (consent) => consent.purpose === line.purpose && (line.carer === null || consent.carer === line.carer),
  )

/**
 * A newly ticked line starts with the only carer who holds parental responsibility, on that basis, where there is
 * exactly one; otherwise with nothing chosen.
 */
export function startConsent(
  line: ConsentLine,
  carers: readonly Pick<GuardianDetails, 'parentalResponsibility'>[],
  method: ConsentMethod | null,
): ConsentDraft {
  const holders = carers.flatMap((carer, index) => {
    const position = carerPositions[index]
    return carer.parentalResponsibility === 'yes' && position ? [position] : []
  })
  const carer = line.carer ?? (holders.length === 1 ? (holders[0] ?? null) : null)
  const holds = carer !== null && holders.includes(carer)
  return {
    purpose: line.purpose,
    carer,
    basis: holds ? 'parental_responsibility' : null,
    method,
    expiresOn: null,
  }
}
