import { describe, expect, it } from 'vitest'
import { ageBand, birthDateProblem, referralDayProblems } from '../../shared/birthDates.ts'

// Limits are this clinic's own rule; no source.
describe('a birth date', () => {
  it.each([
    ['2026-12-01', 'born on the day itself', '2026-12-01', null],
    ['2026-12-02', 'born the day after', '2026-12-01', 'after 1 Dec 2026'],
    ['2007-12-02', 'a day short of nineteen', '2026-12-01', null],
    ['2007-12-01', 'nineteen on the day', '2026-12-01', '19 years'],
    ['1908-05-04', 'a century too early', '2026-12-01', '118 years'],
  ])('%s (%s) seen on %s: %s', (birth, _what, on, problem) => {
    const found = birthDateProblem(birth, on)
    if (problem === null) expect(found).toBeNull()
    else expect(found).toContain(problem)
  })

  it('is told apart from a wrong date received', () => {
    const today = '2026-12-01'
    expect(referralDayProblems({ birthDate: '2019-01-01', receivedOn: '2026-12-02' }, today)).toEqual({
      receivedOn: 'The date received cannot be in the future: today is 1 Dec 2026',
    })
    expect(
      Object.keys(referralDayProblems({ birthDate: '2026-11-30', receivedOn: '2026-11-29' }, today)),
    ).toEqual(['birthDate'])
    expect(referralDayProblems({ birthDate: '2019-01-01', receivedOn: today }, today)).toEqual({})
  })
})

describe('an age band', () => {
  it.each([
    ['2026-06-01', 'under 2 years'],
    ['2024-12-01', '2 to 3 years'],
    ['2020-01-01', '6 to 7 years'],
    ['2019-01-01', '6 to 7 years'],
    ['2018-12-01', '8 to 9 years'],
  ])('of a child born %s, on 1 Dec 2026, is %s', (birth, band) => {
    expect(ageBand(birth, '2026-12-01')).toBe(band)
  })
})
