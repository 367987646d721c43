import type { GuardianDetails, GuardianRelation, ParentalResponsibility } from '@shared/guardians.ts'

export const responsibilityLabels: Record<ParentalResponsibility, string> = {
  yes: 'Yes',
  no: 'No',
  unknown: 'Not known yet',
}

/** As typed: a choice may be empty until it is sent. */
export type GuardianInWork = Omit<GuardianDetails, 'relation' | 'parentalResponsibility'> & {
  relation: GuardianRelation | null
  parentalResponsibility: ParentalResponsibility | null
}

/** Nothing is assumed of a new carer: responsibility is asked, and contact counts as safe until somebody says no. */
export const newGuardian = (): GuardianInWork => ({
  name: '',
  relation: null,
  parentalResponsibility: null,
  courtOrder: false,
  safeToContact: true,
  email: null,
  phone: null,
  address: null,
})

/** Only what may be written; account, restriction and rights stay behind. */
export const guardianDraftOf = (guardian: GuardianDetails): GuardianInWork => ({
  name: guardian.name,
  relation: guardian.relation,
  parentalResponsibility: guardian.parentalResponsibility,
  courtOrder: guardian.courtOrder,
  safeToContact: guardian.safeToContact,
  email: guardian.email,
  phone: guardian.phone,
  address: guardian.address,
})
