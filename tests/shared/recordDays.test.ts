import { describe, expect, it } from 'vitest'
import { pastDayProblem } from '../../shared/recordDays.ts'

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
