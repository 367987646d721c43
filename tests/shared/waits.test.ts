import { describe, expect, it } from 'vitest'
import { summariseWaits, waitDays, waitLevel } from '../../shared/waits.ts'

describe('the summary of waits', () => {
  // Worked by hand: the median is the middle, or half-way between the two middles; the 90th percentile is the value at
  // rank ⌈0.9 n⌉ of the sorted list (nearest-rank method).
  it.each([
    ['nobody', [], { median: null, p90: null, longest: null, n: 0 }],
    ['one child who came today', [0], { median: 0, p90: 0, longest: 0, n: 1 }],
    ['two', [10, 4], { median: 7, p90: 10, longest: 10, n: 2 }],
    ['the six of the demo', [22, 35, 61, 18, 137, 30], { median: 32.5, p90: 137, longest: 137, n: 6 }],
    ['ten', [1, 2, 3, 4, 5, 6, 7, 8, 9, 100], { median: 5.5, p90: 9, longest: 100, n: 10 }],
    ['eleven', [11, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10], { median: 6, p90: 10, longest: 11, n: 11 }],
    ['equal waits', [5, 5, 5], { median: 5, p90: 5, longest: 5, n: 3 }],
  ])('of %s', (_who, days, summary) => {
    expect(summariseWaits(days)).toEqual(summary)
  })

  it('leaves the list it was given as it was', () => {
    const days = [3, 1, 2]
    summariseWaits(days)
    expect(days).toEqual([3, 1, 2])
  })
})

describe('one wait', () => {
  it('counts calendar days since the referral was received, less the days it was paused', () => {
    // 15 Jul to 29 Nov 2026: 16 + 31 + 30 + 31 + 29 days.
    expect(waitDays('2026-07-15', '2026-11-29')).toBe(137)
    expect(waitDays('2026-07-15', '2026-11-29', 20)).toBe(117)
    expect(waitDays('2026-11-29', '2026-11-29')).toBe(0)
  })

  // Clinic rule: target 18 weeks = 126 days, shown two weeks before.
  it.each([
    [111, null],
    [112, 'soon'],
    [126, 'soon'],
    [127, 'overdue'],
    [0, null],
  ])('of %i days against 18 weeks is %s', (days, level) => {
    expect(waitLevel(days, 18)).toBe(level)
  })
})
