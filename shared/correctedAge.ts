import { ageInMonths, compareDays, correctedAge, type CalendarAge, type Day } from './days.ts'

/*
 * The corrected age of a child born early, in words. The arithmetic is in days.ts: chronological age less the days born
 * before 40 weeks (American Academy of Pediatrics 2004, Pediatrics 114:1362-1364), for a birth before 37 completed weeks
 * and up to a limit that the clinic sets (24 months: NICE NG72; the Academy allows 36). Days are exact; no rounding.
 */

/** Corrected weeks from weeks: age less the weeks born before 40; the age itself at 40 weeks or later. */
export const correctedWeeks = (chronologicalWeeks: number, gestationWeeks: number): number =>
  chronologicalWeeks - Math.max(0, 40 - gestationWeeks)

/**
 * Corrected months as the Academy's policy writes them, in months of four weeks. Kept to compare with paper forms only:
 * day arithmetic is exact and is what the product uses.
 */
export const correctedMonthsOfPolicy = (chronologicalMonths: number, gestationWeeks: number): number =>
  chronologicalMonths - Math.max(0, 40 - gestationWeeks) / 4

/**
 * Age as many printed forms reckon it, with every month borrowed as 30 days: a day off the calendar's answer in some
 * months. Kept to compare with paper forms only. Throws RangeError when `on` is before the birth.
 */
export function ageOfPaperForm(birth: Day, on: Day): CalendarAge {
  if (compareDays(on, birth) < 0) throw new RangeError(`${on} is before the birth date ${birth}`)
  const [fromYear, fromMonth, fromDate] = birth.split('-').map(Number) as [number, number, number]
  const [toYear, toMonth, toDate] = on.split('-').map(Number) as [number, number, number]
  const borrowed = toDate < fromDate
  const months = (toYear - fromYear) * 12 + toMonth - fromMonth - (borrowed ? 1 : 0)
  return {
    years: Math.floor(months / 12),
    months: months % 12,
    days: toDate + (borrowed ? 30 : 0) - fromDate,
  }
}

interface BornEarly {
  birth: Day
  on: Day
  /** Completed weeks; null when not known. */
  gestationWeeks: number | null
  /** Clinic setting. */
  limitMonths: number
}

/**
 * '23 weeks corrected (born at 28 weeks)', 'before due date (born at 30 weeks)', or '2 y 1 m corrected …' from two years.
 * Null when no corrected age is to be used: born at 37 weeks or later, not known, or past the clinic's limit.
 */
export function correctedAgeText({ birth, on, gestationWeeks, limitMonths }: BornEarly): string | null {
  if (gestationWeeks === null || compareDays(on, birth) < 0) return null
  const age = correctedAge({ birth, on, gestationWeeks, limitMonths })
  if (!age.useCorrected) return null
  const born = `born at ${gestationWeeks} weeks`
  if (age.beforeDueDate) return `before due date (${born})`
  const months = ageInMonths(age.dueDate, on)
  if (months >= 24) return `${Math.floor(months / 12)} y ${months % 12} m corrected (${born})`
  const weeks = Math.floor(age.correctedDays / 7)
  return `${weeks} ${weeks === 1 ? 'week' : 'weeks'} corrected (${born})`
}
