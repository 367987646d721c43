import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  addDays,
  addWeeks,
  addWorkingDays,
  ageInMonths,
  ageInYears,
  chronologicalAge,
  compareDays,
  correctedAge,
  dayField,
  dayOf,
  daysBetween,
  formatAge,
  formatDay,
  formatMoment,
  isDay,
  optionalDayField,
  usesCorrectedAge,
  weeksBetween,
  workingDaysBetween,
} from '../../shared/days.ts'

const anyDay = fc.integer({ min: 0, max: 90_000 }).map((n) => addDays('1950-01-01', n))

describe('isDay', () => {
  it.each(['2026-03-03', '2024-02-29', '2000-02-29', '1999-12-31'])('accepts the real day %s', (day) => {
    expect(isDay(day)).toBe(true)
  })

  // Gregorian calendar: 1900 and 2023 are no leap years.
  it.each([
    '2023-02-29',
    '1900-02-29',
    '2026-02-31',
    '2026-04-31',
    '2026-13-01',
    '2026-00-10',
    '2026-01-00',
    '0206-01-01',
    '2026-3-3',
    '03/03/2026',
    '2026-03-03T00:00:00Z',
    ' 2026-03-03',
    '',
    null,
    undefined,
    20260303,
  ])('refuses %j', (value) => {
    expect(isDay(value)).toBe(false)
  })
})

describe('day arithmetic', () => {
  it.each([
    ['2026-02-28', 1, '2026-03-01'],
    ['2024-02-28', 1, '2024-02-29'],
    ['2026-01-01', -1, '2025-12-31'],
    // Clocks go forward on 29 Mar 2026 in Britain: a day is still a day.
    ['2026-03-28', 2, '2026-03-30'],
  ])('adds days: %s and %i is %s', (day, n, expected) => {
    expect(addDays(day, n)).toBe(expected)
  })

  it('counts a wait of 137 days as 19.57 weeks', () => {
    expect(weeksBetween('2026-01-01', addDays('2026-01-01', 137))).toBeCloseTo(19.571, 3)
    expect(addWeeks('2026-01-01', 12)).toBe('2026-03-26')
  })

  it('goes back to where it came from for any day and any step', () => {
    fc.assert(
      fc.property(anyDay, fc.integer({ min: -40_000, max: 20_000 }), (day, n) => {
        const moved = addDays(day, n)
        fc.pre(isDay(moved))
        expect(daysBetween(day, moved)).toBe(n)
        expect(addDays(moved, -n)).toBe(day)
        expect(Math.abs(compareDays(day, moved))).toBe(Math.min(1, Math.abs(n)))
      }),
    )
  })

  it('throws a RangeError for a day that does not exist rather than moving it', () => {
    expect(() => addDays('2026-02-31', 1)).toThrow(RangeError)
    expect(() => formatDay('soon')).toThrow(RangeError)
  })
})

describe('moments and zones', () => {
  it('takes the day from the zone asked for, not from UTC', () => {
    const lateEvening = new Date('2026-06-30T23:30:00Z')
    expect(dayOf(lateEvening, 'UTC')).toBe('2026-06-30')
    expect(dayOf(lateEvening, 'Europe/London')).toBe('2026-07-01')
    expect(dayOf(lateEvening, 'America/Toronto')).toBe('2026-06-30')
  })

  it('shows days and moments the house way', () => {
    expect(formatDay('2026-03-03')).toBe('3 Mar 2026')
    expect(formatDay('2026-09-14')).toBe('14 Sep 2026')
    expect(formatMoment('2026-03-03T14:05:00Z', 'Europe/London')).toBe('3 Mar 2026, 14:05')
    expect(formatMoment('2026-07-03T23:05:00Z', 'Europe/London')).toBe('4 Jul 2026, 00:05')
  })
})

// Calendar borrow, unrounded. AGE-01 and AGE-03 read on age-calculation pages (31;1;7 and 30;5;15); the others
// derived by hand from the same rule.
describe('chronologicalAge', () => {
  it.each([
    ['AGE-01', '1995-02-18', '2026-03-25', 31, 1, 7],
    // The paper-form habit of borrowing 30 days would give 30;5;14 here: we borrow the real month.
    ['AGE-03', '1979-08-26', '2010-02-10', 30, 5, 15],
    ['AGE-05', '1990-05-15', '2023-10-10', 33, 4, 25],
    ['AGE-06', '2016-02-29', '2026-02-28', 9, 11, 30],
    ['AGE-07', '2016-02-29', '2026-03-01', 10, 0, 1],
    ['AGE-09', '2020-06-15', '2026-06-15', 6, 0, 0],
    ['AGE-10', '2020-06-15', '2026-06-14', 5, 11, 30],
    ['AGE-11', '2019-01-31', '2026-03-01', 7, 1, 1],
    ['born today', '2026-03-01', '2026-03-01', 0, 0, 0],
    ['January borrows December', '2019-12-20', '2026-01-10', 6, 0, 21],
  ])('%s: born %s, seen %s', (_id, birth, on, years, months, days) => {
    expect(chronologicalAge(birth, on)).toEqual({ years, months, days })
  })

  it('never goes back in whole months as days pass', () => {
    fc.assert(
      fc.property(anyDay, fc.integer({ min: 0, max: 9000 }), (birth, n) => {
        const on = addDays(birth, n)
        fc.pre(isDay(on) && isDay(addDays(on, 1)))
        const step = ageInMonths(birth, addDays(on, 1)) - ageInMonths(birth, on)
        expect(step === 0 || step === 1).toBe(true)
        const { months, days } = chronologicalAge(birth, on)
        expect(months).toBeLessThan(12)
        expect(days).toBeLessThan(31)
      }),
    )
  })

  it('formats ages as years and months and says so before the birth', () => {
    expect(formatAge('2018-11-03', '2026-03-05')).toBe('7 y 4 m')
    expect(ageInYears('2018-11-03', '2026-03-05')).toBe(7)
    expect(formatAge('2018-11-03', '2018-11-02')).toBe('before birth')
    expect(() => chronologicalAge('2018-11-03', '2018-11-02')).toThrow(RangeError)
  })
})

// COR-01 read on a dietetics study page (34 weeks, 16 weeks old: 10 weeks); the rest derived from the definition in
// AAP 2004, Pediatrics 114:1362-1364; 37 weeks and 24 months from NICE NG72.
describe('correctedAge', () => {
  it.each([
    ['COR-01', '2026-01-05', '2026-04-27', 34, 42, '2026-02-16', 112, 70],
    ['COR-02', '2024-03-10', '2026-03-10', 28, 84, '2024-06-02', 730, 646],
    ['COR-08', '2026-01-05', '2026-01-12', 30, 70, '2026-03-16', 7, -63],
    ['after 40 weeks nothing is taken off', '2026-01-05', '2026-01-12', 41, 0, '2025-12-29', 7, 7],
  ])('%s', (_id, birth, on, gestationWeeks, daysEarly, dueDate, chronologicalDays, correctedDays) => {
    const age = correctedAge({ birth, on, gestationWeeks })
    expect(age).toMatchObject({ daysEarly, dueDate, chronologicalDays, correctedDays })
    expect(age.beforeDueDate).toBe(correctedDays < 0)
  })

  it('COR-03: 16 weeks old, born at 34 weeks, is 10 weeks corrected', () => {
    const age = correctedAge({ birth: '2026-01-05', on: addWeeks('2026-01-05', 16), gestationWeeks: 34 })
    expect(age.correctedDays / 7).toBe(10)
  })

  it.each([
    ['COR-05', 23, 31, 24, true],
    ['COR-06', 30, 31, 24, false],
    ['COR-06 with the longer limit', 30, 31, 36, true],
    ['COR-07', 12, 38, 24, false],
  ])(
    '%s: uses the corrected age only when preterm and under the limit',
    (_id, months, weeks, limit, expected) => {
      expect(usesCorrectedAge(months, weeks, limit)).toBe(expected)
    },
  )

  it('counts odd days of gestation and applies the limit to the calendar age', () => {
    const age = correctedAge({ birth: '2025-06-01', on: '2026-06-01', gestationWeeks: 33, gestationDays: 3 })
    expect(age.daysEarly).toBe(46)
    expect(age.useCorrected).toBe(true)
    expect(correctedAge({ birth: '2023-06-01', on: '2026-06-01', gestationWeeks: 33 }).useCorrected).toBe(
      false,
    )
  })
})

// Common practice, no source: Monday to Friday, counted from the day after.
describe('working days', () => {
  it.each([
    ['2026-03-02', 5, [], '2026-03-09'],
    ['2026-03-06', 1, [], '2026-03-09'],
    ['2026-03-07', 1, [], '2026-03-09'],
    ['2026-04-02', 1, ['2026-04-03', '2026-04-06'], '2026-04-07'],
    ['2026-03-09', -1, [], '2026-03-06'],
    ['2026-03-07', 0, [], '2026-03-07'],
  ])('from %s, %i working days on', (from, n, holidays, expected) => {
    expect(addWorkingDays(from, n, holidays)).toBe(expected)
  })

  it('counts back what it added', () => {
    fc.assert(
      fc.property(anyDay, fc.integer({ min: 0, max: 60 }), (day, n) => {
        const holidays = [addDays(day, 3), addDays(day, 10)]
        const due = addWorkingDays(day, n, holidays)
        fc.pre(isDay(due))
        expect(workingDaysBetween(day, due, holidays)).toBe(n)
        expect(workingDaysBetween(due, day, holidays)).toBe(0 - n)
      }),
    )
  })
})

describe('dayField', () => {
  const field = dayField('The date of birth')

  it.each([
    ['2026-02-31', 'The date of birth cannot be 31 February 2026: that month has 28 days'],
    ['2026-13-01', 'The date of birth has month 13: months go from 1 to 12'],
    ['0206-01-01', 'The date of birth has the year 0206: check the year'],
    ['2026-05-00', 'The date of birth has day 0: days start at 1'],
    ['tomorrow', 'The date of birth needs a day, a month and a year, for example 3 Mar 2026'],
  ])('says what is wrong with %s', async (value, message) => {
    await expect(field.validate(value)).rejects.toThrow(message)
  })

  it('lets a real day through unchanged', async () => {
    await expect(field.validate('2018-11-03')).resolves.toBe('2018-11-03')
  })

  it.each([undefined, ''])(
    'asks for a missing day once, with one message, when it gets %j',
    async (value) => {
      await expect(field.validate(value, { abortEarly: false })).rejects.toMatchObject({
        errors: ['Enter the date of birth'],
      })
    },
  )

  it('takes null for an absent day only where it may be missing, and never the empty string', async () => {
    const optional = optionalDayField('The next review')
    await expect(optional.validate(null)).resolves.toBeNull()
    await expect(optional.validate('2026-02-30')).rejects.toThrow(
      'The next review cannot be 30 February 2026',
    )
    await expect(optional.validate('')).rejects.toThrow('The next review needs a day')
    await expect(field.validate(null)).rejects.toThrow('Enter the date of birth')
  })
})
