import {
  addDays as addCalendarDays,
  differenceInCalendarDays,
  formatISO,
  getDaysInMonth,
  isWeekend,
  parseISO,
} from 'date-fns'
import { string, type TestContext } from 'yup'

/**
 * A calendar day as 'YYYY-MM-DD'. Text on purpose: no time zone can move a birthday.
 * Everything that counts in days goes through this file.
 */
export type Day = string

const shortMonths = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']
const longMonths = [
  ...['January', 'February', 'March', 'April', 'May', 'June'],
  ...['July', 'August', 'September', 'October', 'November', 'December'],
]

interface DayParts {
  year: number
  month: number
  date: number
}

const daysInMonth = (year: number, month: number): number => getDaysInMonth(new Date(year, month - 1))

const pad = (value: number, width: number): string => String(value).padStart(width, '0')

/** Is this text a real calendar day between 1900 and 2199, written 'YYYY-MM-DD'? */
export function isDay(value: unknown): value is Day {
  return typeof value === 'string' && dayProblem(value) === null
}

/** What is wrong with a typed day, in words for the person who typed it; null when nothing is. */
export function dayProblem(value: string): string | null {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(value)
  if (!match) return 'needs a day, a month and a year, for example 3 Mar 2026'
  const [year, month, date] = match.slice(1).map(Number) as [number, number, number]
  if (year < 1900 || year > 2199) return `has the year ${pad(year, 4)}: check the year`
  const name = longMonths[month - 1]
  if (name === undefined) return `has month ${month}: months go from 1 to 12`
  const last = daysInMonth(year, month)
  if (date < 1) return 'has day 0: days start at 1'
  if (date > last) return `cannot be ${date} ${name} ${year}: that month has ${last} days`
  return null
}

function partsOf(day: Day): DayParts {
  if (!isDay(day)) throw new RangeError(`Not a calendar day: ${day}`)
  return { year: Number(day.slice(0, 4)), month: Number(day.slice(5, 7)), date: Number(day.slice(8, 10)) }
}

/** Midnight of the day where the program runs. Only ever used to count calendar days, so the zone cancels out. */
function midnightOf(day: Day): Date {
  partsOf(day)
  return parseISO(day)
}

/** The day `n` days later (earlier when negative). Throws RangeError when `day` is not a real day. */
export const addDays = (day: Day, n: number): Day =>
  formatISO(addCalendarDays(midnightOf(day), n), { representation: 'date' })

/** The day `n` weeks later. */
export const addWeeks = (day: Day, n: number): Day => addDays(day, n * 7)

/** Whole days from one day to another; negative when `to` comes first. */
export const daysBetween = (from: Day, to: Day): number =>
  differenceInCalendarDays(midnightOf(to), midnightOf(from))

/** Weeks from one day to another, not rounded: 137 days are 19.57 weeks. */
export const weeksBetween = (from: Day, to: Day): number => daysBetween(from, to) / 7

/** Sort order of two days: -1, 0 or 1. */
export const compareDays = (a: Day, b: Day): -1 | 0 | 1 => (a < b ? -1 : a > b ? 1 : 0)

const zonedFormats = new Map<string, Intl.DateTimeFormat>()

function zonedParts(moment: Date, timeZone: string): Map<string, string> {
  // Building a formatter costs far more than using it, and lists format hundreds of moments.
  let format = zonedFormats.get(timeZone)
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', {
      timeZone,
      hourCycle: 'h23',
      year: 'numeric',
      month: '2-digit',
      day: '2-digit',
      hour: '2-digit',
      minute: '2-digit',
    })
    zonedFormats.set(timeZone, format)
  }
  return new Map(format.formatToParts(moment).map((part) => [part.type, part.value]))
}

/** The calendar day a moment falls on in a time zone, for example 'Europe/London'. */
export function dayOf(date: Date, timeZone: string): Day {
  const parts = zonedParts(date, timeZone)
  return `${parts.get('year')}-${parts.get('month')}-${parts.get('day')}`
}

/** '3 Mar 2026'. */
export function formatDay(day: Day): string {
  const { year, month, date } = partsOf(day)
  return `${date} ${shortMonths[month - 1]} ${year}`
}

/** '3 Mar 2026, 14:05' in the given time zone, from an ISO moment. */
export function formatMoment(iso: string, timeZone: string): string {
  const moment = new Date(iso)
  const parts = zonedParts(moment, timeZone)
  return `${formatDay(dayOf(moment, timeZone))}, ${parts.get('hour')}:${parts.get('minute')}`
}

export interface CalendarAge {
  years: number
  months: number
  days: number
}

/**
 * Age by calendar subtraction, never rounded: a missing day borrows the month before `on`; where that month is
 * shorter than the day of birth, days count from its end. Throws RangeError when `on` is before the birth.
 */
export function chronologicalAge(birth: Day, on: Day): CalendarAge {
  const from = partsOf(birth)
  const to = partsOf(on)
  if (compareDays(on, birth) < 0) throw new RangeError(`${on} is before the birth date ${birth}`)
  let months = (to.year - from.year) * 12 + to.month - from.month
  let days = to.date - from.date
  if (days < 0) {
    months -= 1
    days = to.date + Math.max(0, daysInMonth(to.year, to.month - 1) - from.date)
  }
  return { years: Math.floor(months / 12), months: months % 12, days }
}

/** Completed years. */
export const ageInYears = (birth: Day, on: Day): number => chronologicalAge(birth, on).years

/** Completed months: 100 for a child of 8 years 4 months. */
export function ageInMonths(birth: Day, on: Day): number {
  const age = chronologicalAge(birth, on)
  return age.years * 12 + age.months
}

/** '7 y 4 m'; 'before birth' when the day lies before the birth date. */
export function formatAge(birth: Day, on: Day): string {
  if (compareDays(on, birth) < 0) return 'before birth'
  const age = chronologicalAge(birth, on)
  return `${age.years} y ${age.months} m`
}

const isWorkingDay = (day: Day, holidays: ReadonlySet<Day>): boolean =>
  !isWeekend(midnightOf(day)) && !holidays.has(day)

/** The nth working day (Monday to Friday, not a holiday) after `day`; `n` of 0 gives the day itself. */
export function addWorkingDays(day: Day, n: number, holidays: readonly Day[] = []): Day {
  const closed = new Set(holidays)
  const step = Math.sign(n)
  let reached = addDays(day, 0)
  for (let left = Math.abs(n); left > 0;) {
    reached = addDays(reached, step)
    if (isWorkingDay(reached, closed)) left -= 1
  }
  return reached
}

/** Working days after `from` up to and including `to`; negative when `to` comes first. */
export function workingDaysBetween(from: Day, to: Day, holidays: readonly Day[] = []): number {
  if (compareDays(to, from) < 0) return 0 - workingDaysBetween(to, from, holidays)
  const closed = new Set(holidays)
  let count = 0
  for (let day = addDays(from, 1); compareDays(day, to) <= 0; day = addDays(day, 1)) {
    if (isWorkingDay(day, closed)) count += 1
  }
  return count
}

const termDays = 40 * 7
const pretermBelowWeeks = 37

/**
 * Should a corrected age be used? Only for a child born before 37 completed weeks (NICE NG72) and below a limit,
 * 24 months unless the clinic sets another (the American Academy of Pediatrics allows up to 36).
 */
export const usesCorrectedAge = (
  chronologicalMonths: number,
  gestationWeeks: number,
  limitMonths = 24,
): boolean => gestationWeeks < pretermBelowWeeks && chronologicalMonths < limitMonths

export interface CorrectedAge {
  /** Days born before 40 weeks; 0 at term or later. */
  daysEarly: number
  dueDate: Day
  chronologicalDays: number
  /** Negative before the due date: say so in words instead of showing a negative age. */
  correctedDays: number
  beforeDueDate: boolean
  useCorrected: boolean
}

/**
 * Age less the days born before 40 weeks (American Academy of Pediatrics 2004, Pediatrics 114:1362-1364).
 * `gestationWeeks` are completed weeks, never rounded up.
 */
export function correctedAge(input: {
  birth: Day
  on: Day
  gestationWeeks: number
  gestationDays?: number
  limitMonths?: number
}): CorrectedAge {
  const gestation = input.gestationWeeks * 7 + (input.gestationDays ?? 0)
  const daysEarly = Math.max(0, termDays - gestation)
  const chronologicalDays = daysBetween(input.birth, input.on)
  const months = chronologicalDays < 0 ? 0 : ageInMonths(input.birth, input.on)
  return {
    daysEarly,
    dueDate: addDays(input.birth, termDays - gestation),
    chronologicalDays,
    correctedDays: chronologicalDays - daysEarly,
    beforeDueDate: chronologicalDays - daysEarly < 0,
    useCorrected: usesCorrectedAge(months, input.gestationWeeks, input.limitMonths),
  }
}

const startLower = (label: string): string => label.charAt(0).toLowerCase() + label.slice(1)

function calendarDay(this: TestContext, label: string, value: string | null | undefined) {
  if (value === undefined || value === null) return true
  const problem = dayProblem(value)
  return problem === null || this.createError({ message: `${label} ${problem}` })
}

/**
 * A yup field for a day that must be given, sent as 'YYYY-MM-DD'. `label` starts the message, which says what is
 * wrong: 'The date of birth cannot be 31 February 2026: that month has 28 days'.
 */
export const dayField = (label: string) =>
  string()
    .required(`Enter ${startLower(label)}`)
    .test('calendar-day', function (value) {
      return value === '' || calendarDay.call(this, label, value)
    })

/** As `dayField`, for a day that may be missing. Absence is null, never the empty string. */
export const optionalDayField = (label: string) =>
  string()
    .nullable()
    .defined()
    .test('calendar-day', function (value) {
      return calendarDay.call(this, label, value)
    })
