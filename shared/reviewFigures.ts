import { countersignDays } from './caseloadNeeds.ts'
import type { ReviewFigureId } from './review.ts'
import type { ClinicSettings } from './settings.ts'

type Thresholds = Pick<
  ClinicSettings,
  'waitTargetWeeks' | 'unsignedSoonHours' | 'unsignedOverdueHours' | 'untriagedWorkingDays'
>

/** Name of each figure and the rule in force, in words: the same beside the number and above the list behind it. */
export const reviewFigureTexts = (
  settings: Thresholds,
): Record<ReviewFigureId, { label: string; rule: string }> => ({
  waiting: { label: 'Waiting', rule: 'from the referral until the assessment begins' },
  waiting_over_target: {
    label: 'Waiting too long',
    rule: `over ${settings.waitTargetWeeks} weeks`,
  },
  reviews_overdue: { label: 'Reviews overdue', rule: 'the day has passed and the episode is open' },
  notes_unsigned_24: {
    label: 'Notes to sign',
    rule: `over ${settings.unsignedSoonHours} hours after the session`,
  },
  notes_unsigned_48: {
    label: 'Notes long unsigned',
    rule: `over ${settings.unsignedOverdueHours} hours after the session`,
  },
  notes_to_countersign: {
    label: 'Notes to countersign',
    rule: `overdue after ${countersignDays} days`,
  },
  letters_to_approve: { label: 'Letters to approve', rule: 'by newly qualified colleagues' },
  letters_failed: { label: 'Letters not delivered', rule: 'the address was refused or not reached' },
  consent_missing: {
    label: 'Consent missing',
    rule: 'open, and none to assessment and therapy in force',
  },
  referrals_untriaged: {
    label: 'Referrals not looked at',
    rule: `over ${settings.untriagedWorkingDays} working days`,
  },
  alerts_open: { label: 'Warning signs open', rule: 'nothing written down yet about what was done' },
})
