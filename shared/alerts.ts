import { type InferType } from 'yup'
import type { Attention } from './attention.ts'
import { body, choice, text } from './fields.ts'
import type { Page } from './pages.ts'
import { redFlagIds, type RedFlagUrgency } from './redFlagRows.ts'

/** What was done about a warning sign: it stays on the record with who did it and when. */
export const alertActionSchema = body({ action: text('What was done', { min: 5, max: 1000 }) })
export type AlertAction = InferType<typeof alertActionSchema>

/** A therapist raises a sign by hand: a row of the clinic's table, and what was seen or told. */
export const alertRaisedSchema = body({
  flag: choice('the warning sign', redFlagIds),
  words: text('What was seen or told', { min: 5, max: 400 }),
})
export type AlertRaised = InferType<typeof alertRaisedSchema>

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
export const alertOriginLabels: Record<AlertOrigin, string> = {
  referral: 'Referral',
  history: 'History',
  questionnaire: 'Questionnaire',
  measure: 'Measure',
  observation: 'Writing observation',
  therapist: 'Raised by hand',
}

/** A warning sign with what was done about it, for the record. */
export interface AlertView {
  id: string
  flag: string
  /** What was reported. */
  text: string
  level: Attention
  urgency: RedFlagUrgency
  /** What is usually done; null where the text says it. */
  advice: string | null
  /** No routine block is booked until somebody has written down what was done. */
  holdsBooking: boolean
  origin: AlertOrigin
  originId: string | null
  raisedAt: string
  /** Null when an answer given at home raised it without signing in. */
  raisedBy: string | null
  actedAt: string | null
  actedBy: string | null
  action: string | null
  can: { act: boolean }
}

/** What waits for somebody first, the most urgent of it leading; then what was answered, the newest first. */
export interface AlertPage extends Page<AlertView> {
  /** How many of all wait for somebody. */
  open: number
}
