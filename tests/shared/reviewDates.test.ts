import { describe, expect, it } from 'vitest'
import { reviewDateAfter } from '../../shared/reviewDates.ts'

// Clinic rule: twelve weeks unless the clinic sets another interval. 1 Dec 2026 + 84 days = 23 Feb 2027.
describe('the next review', () => {
  it.each([
    ['a block begins without a date', 'formulated', 'active', null, '2027-02-23'],
    ['a block begins and a date is set', 'formulated', 'active', '2027-01-10', '2027-01-10'],
    ['a block ends without a date', 'active', 'review', null, '2027-02-23'],
    ['a block ends and the review is overdue', 'active', 'review', '2026-11-01', '2026-11-01'],
    ['a new block follows a review', 'review', 'active', '2026-11-01', '2027-02-23'],
    ['the assessment begins', 'consented', 'assessing', null, null],
    ['the child is discharged', 'review', 'discharged', '2026-11-01', null],
    ['consent is withdrawn', 'active', 'consent_withdrawn', '2027-01-10', null],
  ] as const)('when %s', (_what, from, to, nextReviewOn, expected) => {
    expect(reviewDateAfter({ from, to, nextReviewOn, today: '2026-12-01', reviewWeeks: 12 })).toBe(expected)
  })
})
