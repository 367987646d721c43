import type { Agreement } from '@shared/kappa.ts'
import { itemChangeLabels, itemChanges, type FormComparison } from '@shared/occasions.ts'

const percent = (share: number) => `${Math.round(100 * share)}%`

/** A figure with a true minus sign, e.g. '−0.12'. */
const signed = (value: number) => value.toFixed(2).replace('-', '−')

/** 'Agree on 6 of 9: 67% (95% interval 35% to 88%)'. The percentage never stands without its number. */
export function shareWords({ agreed, compared, share, shareInterval }: Agreement): string {
  if (share === null) return 'Nothing to compare: no activity was answered with a side by both'
  const interval = shareInterval
    ? ` (95% interval ${percent(shareInterval.low)} to ${percent(shareInterval.high)})`
    : ''
  return `Agree on ${agreed} of ${compared}: ${percent(share)}${interval}`
}

/** 'Cohen’s kappa 0.40 (95% interval −0.10 to 0.90)'; null where there is none to give. */
export function kappaWords({ kappa, kappaInterval }: Agreement): string | null {
  if (kappa === null) return null
  const interval = kappaInterval
    ? ` (95% interval ${signed(kappaInterval.low)} to ${signed(kappaInterval.high)})`
    : ''
  return `Cohen’s kappa ${signed(kappa)}${interval}`
}

/** '8 same · 1 another answer': what became of the activities, leaving out what did not happen. */
export const changeWords = ({ counts }: Pick<FormComparison, 'counts'>): string =>
  itemChanges
    .filter((change) => counts[change] > 0)
    .map((change) => `${counts[change]} ${itemChangeLabels[change].toLowerCase()}`)
    .join(' · ')
