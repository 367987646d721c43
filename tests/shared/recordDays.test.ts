import { describe, expect, it } from 'vitest'
import { pastDayProblem, targetDayProblem } from '../../shared/recordDays.ts'

// By definition: nothing is seen before a birth or after today.
describe('pastDayProblem', () => {
  const life = { birthDate: '2018-05-04', today: '2026-12-01' }

  it.each([
    ['today', '2026-12-01', null],
    ['the day of birth', '2018-05-04', null],
    ['tomorrow', '2026-12-02', 'The date cannot be in the future: today is 1 Dec 2026'],
    [
      'the day before birth',
      '2018-05-03',
      'The date cannot be before the child was born (4 May 2018): check the year',
    ],
  ])('%s', (_what, day, expected) => {
    expect(pastDayProblem('The date', day, life)).toBe(expected)
  })
})

describe('targetDayProblem', () => {
  it.each([
    ['tomorrow', '2026-12-02', null],
    ['today', '2026-12-01', 'The target date must come after today (1 Dec 2026)'],
    ['a year ago', '2025-12-01', 'The target date must come after today (1 Dec 2026)'],
  ])('%s', (_what, day, expected) => {
    expect(targetDayProblem('The target date', day, '2026-12-01')).toBe(expected)
  })
})
