import { boolean, type InferType } from 'yup'
import { body, choice, optionalEmail, optionalPhone, optionalText, text } from './fields.ts'

export const guardianRelations = [
  'mother',
  'father',
  'parent',
  'grandparent',
  'foster_carer',
  'local_authority',
  'self',
  'other',
] as const
export type GuardianRelation = (typeof guardianRelations)[number]
export const guardianRelationLabels: Record<GuardianRelation, string> = {
  mother: 'Mother',
  father: 'Father',
  parent: 'Parent',
  grandparent: 'Grandparent',
  foster_carer: 'Foster carer',
  local_authority: 'Local authority',
  self: 'The young person',
  other: 'Other',
}

export const responsibilityAnswers = ['yes', 'no', 'unknown'] as const
export type ParentalResponsibility = (typeof responsibilityAnswers)[number]

export const guardianSchema = body({
  name: text('The carer’s name', { min: 2, max: 120 }),
  relation: choice('the relation', guardianRelations),
  parentalResponsibility: choice('parental responsibility', responsibilityAnswers),
  courtOrder: boolean().required(),
  safeToContact: boolean().required(),
  email: optionalEmail(),
  phone: optionalPhone(),
  address: optionalText('The address', { max: 300 }),
})
export type GuardianDetails = InferType<typeof guardianSchema>

/** A restriction ends what the carer sees at once; lifting it needs a reason as well. */
export const guardianRestrictionSchema = body({
  restricted: boolean().required(),
  reason: text('The reason', { min: 2, max: 500 }),
})
export type GuardianRestriction = InferType<typeof guardianRestrictionSchema>

export const ownContactSchema = body({
  phone: optionalPhone(),
  address: optionalText('The address', { max: 300 }),
})
export type OwnContact = InferType<typeof ownContactSchema>

/** A carer as staff see them. A guardian only ever gets their own row. */
export interface GuardianView extends GuardianDetails {
  id: string
  account: 'none' | 'invited' | 'active' | 'disabled'
  restricted: boolean
  emailConsent: 'none' | 'link' | 'attachment'
  version: number
  can: { change: boolean; invite: boolean; restrict: boolean }
}
