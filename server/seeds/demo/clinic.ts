import type { ClinicSettings } from '../../../shared/settings.ts'

/** The demo clinic. The telephone numbers lie in a range that is kept free for made-up stories. */
export const clinicSettings: ClinicSettings = {
  clinicName: 'Old Tannery Children’s Clinic',
  clinicAddress: '3 Tannery Lane\nHarrowmere',
  clinicPhone: '01632 960 140',
  timeZone: 'Europe/London',
  waitTargetWeeks: 18,
  reviewWeeks: 12,
  letterTargetWorkingDays: 10,
  untriagedWorkingDays: 10,
  unsignedSoonHours: 24,
  unsignedOverdueHours: 48,
  correctedUntilMonths: 24,
  cutOffSet: 'clinic-40',
  emergencyText:
    'If a child is suddenly weak on one side, has a drooping face, a seizure or a sudden severe headache, call 999 at once. Do not wait for us.',
}
