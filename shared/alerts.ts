import { type InferType } from 'yup'
import { body, text } from './fields.ts'

/** What was done about a warning sign: it stays on the record with who did it and when. */
export const alertActionSchema = body({ action: text('What was done', { min: 5, max: 1000 }) })
export type AlertAction = InferType<typeof alertActionSchema>

/** Where a warning sign was seen. */
export const alertOrigins = [
  'referral',
  'history',
  'questionnaire',
  'measure',
  'observation',
  'therapist',
] as const
export type AlertOrigin = (typeof alertOrigins)[number]
