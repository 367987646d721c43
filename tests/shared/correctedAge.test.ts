import { describe, expect, it } from 'vitest'
import {
  ageOfPaperForm,
  correctedAgeText,
  correctedMonthsOfPolicy,
  correctedWeeks,
} from '../../shared/correctedAge.ts'
import { chronologicalAge } from '../../shared/days.ts'

describe('corrected weeks and months', () => {
  // Worked example read on a dietetics study page.
  it('COR-03: 16 weeks old, born at 34 weeks: 10 weeks', () => {
    expect(correctedWeeks(16, 34)).toBe(10)
    expect(correctedWeeks(16, 40)).toBe(16)
    expect(correctedWeeks(16, 42)).toBe(16)
  })

  // Formula of the American Academy of Pediatrics 2004 read in a summary; the 21 months remembered.
  it('COR-04: 24 months old, born at 28 weeks: 21 months of four weeks', () => {
    expect(correctedMonthsOfPolicy(24, 28)).toBe(21)
    expect(correctedMonthsOfPolicy(24, 40)).toBe(24)
  })
})

describe('age as paper forms reckon it', () => {
  // Common test-manual arithmetic, from memory: every month borrowed as 30 days.
  it('AGE-04: is a day off the calendar’s answer', () => {
    expect(ageOfPaperForm('1979-08-26', '2010-02-10')).toEqual({ years: 30, months: 5, days: 14 })
    expect(chronologicalAge('1979-08-26', '2010-02-10')).toEqual({ years: 30, months: 5, days: 15 })
  })

  it('agrees with the calendar where nothing is borrowed, and refuses a day before birth', () => {
    expect(ageOfPaperForm('2020-06-15', '2026-06-15')).toEqual({ years: 6, months: 0, days: 0 })
    expect(() => ageOfPaperForm('2020-06-15', '2020-06-14')).toThrow(RangeError)
  })
})

describe('the corrected age in words', () => {
  const text = (birth: string, on: string, gestationWeeks: number | null, limitMonths = 24) =>
    correctedAgeText({ birth, on, gestationWeeks, limitMonths })

  it.each([
    // COR-01: 70 days are 10 weeks. COR-08: before the due date.
    ['COR-01', '2026-01-05', '2026-04-27', 34, '10 weeks corrected (born at 34 weeks)'],
    ['COR-08', '2026-01-05', '2026-01-12', 30, 'before due date (born at 30 weeks)'],
    ['on the due date', '2026-01-05', '2026-02-16', 34, '0 weeks corrected (born at 34 weeks)'],
    ['the day before', '2026-01-05', '2026-02-15', 34, 'before due date (born at 34 weeks)'],
    ['one week', '2026-01-05', '2026-02-23', 34, '1 week corrected (born at 34 weeks)'],
    // COR-07: 38 weeks is not early, nor are 37.
    ['at 37 weeks', '2026-01-05', '2026-04-27', 37, null],
    ['not known', '2026-01-05', '2026-04-27', null, null],
  ] as const)('%s', (_what, birth, on, weeks, expected) => {
    expect(text(birth, on, weeks)).toBe(expected)
  })

  it('ends at the clinic’s limit: 24 months, or up to 36', () => {
    expect(text('2024-06-10', '2026-06-09', 28)).toBe('92 weeks corrected (born at 28 weeks)')
    expect(text('2024-06-10', '2026-06-10', 28)).toBeNull()
    expect(text('2023-07-10', '2026-06-10', 28, 36)).toBe('2 y 8 m corrected (born at 28 weeks)')
    expect(text('2026-01-05', '2026-02-16', 34, 0)).toBeNull()
  })

  it('says nothing of a day before birth', () => {
    expect(text('2026-01-05', '2026-01-04', 34)).toBeNull()
  })
})
