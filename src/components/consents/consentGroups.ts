import { consentPurposes, type ConsentPurpose, type ConsentView } from '@shared/consents.ts'

export interface ConsentGroup {
  purpose: ConsentPurpose
  /** Now in force, newest first. */
  inForce: ConsentView[]
  /** Given before and ended since, newest first. */
  past: ConsentView[]
}

/** Every purpose, asked or not, in the order of the form: what was never asked must be as plain as what was refused. */
export function consentGroups(consents: readonly ConsentView[]): ConsentGroup[] {
  const newestFirst = consents.toSorted((a, b) => b.givenAt.localeCompare(a.givenAt))
  return consentPurposes.map((purpose) => {
    const own = newestFirst.filter((consent) => consent.purpose === purpose)
    return {
      purpose,
      inForce: own.filter((consent) => consent.inForce),
      past: own.filter((consent) => !consent.inForce),
    }
  })
}
