import { number, string, type InferType } from 'yup'
import { body, choice, text } from './fields.ts'
import { cutOffSets } from './handUse.ts'

const days = (label: string, min: number, max: number) =>
  number()
    .required(`Enter ${label}`)
    .integer('Whole numbers only')
    .min(min, `At least ${min}`)
    .max(max, `At most ${max}`)

export const settingsSchema = body({
  clinicName: text('The clinic’s name', { min: 2, max: 120 }),
  clinicAddress: text('The address', { min: 5, max: 300 }),
  clinicPhone: text('The phone number', { min: 5, max: 30 }),
  timeZone: string()
    .required('Enter the time zone')
    .test('zone', 'This is not a known time zone, e.g. Europe/London', (value) => isTimeZone(value)),
  waitTargetWeeks: days('the waiting target', 1, 104),
  reviewWeeks: days('the review interval', 1, 52),
  letterTargetWorkingDays: days('the letter target', 1, 60),
  untriagedWorkingDays: days('the time to first look', 1, 60),
  unsignedSoonHours: days('the first limit for unsigned notes', 1, 240),
  unsignedOverdueHours: days('the second limit for unsigned notes', 1, 480),
  correctedUntilMonths: days('how long the corrected age is used', 0, 36),
  cutOffSet: choice(
    'a cut-off set',
    cutOffSets.map((set) => set.id),
  ),
  emergencyText: text('What families do in an emergency', { min: 10, max: 500 }),
})
export type ClinicSettings = InferType<typeof settingsSchema>

export interface ClinicSettingsView extends ClinicSettings {
  version: number
  can: { change: boolean }
}

/** True for a zone this runtime knows. */
export function isTimeZone(value: string | undefined): boolean {
  if (!value) return false
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone: value })
    return true
  } catch {
    return false
  }
}
