import { addDays, isDay, type Day } from '../../../shared/days.ts'
import type { Offset } from './demoTypes.ts'

/** The day an offset stands for. */
export const demoDay = (demoToday: Day, offset: Offset): Day => addDays(demoToday, offset)

// 1 Jan 1970 was a Thursday.
const daysSinceSaturday = (day: Day) => (Math.round(Date.parse(`${day}T00:00:00Z`) / 86_400_000) + 5) % 7

/**
 * The same, moved back to Friday when it falls on a weekend: clinic work is done on weekdays. Never changes the order
 * of two days.
 */
export function demoWorkday(demoToday: Day, offset: Offset): Day {
  const day = demoDay(demoToday, offset)
  const past = daysSinceSaturday(day)
  return past <= 1 ? addDays(day, -(past + 1)) : day
}

/** The birth date of a child who is so many years, months and days old on the demo day. */
export function birthDateFor(demoToday: Day, age: { years: number; months: number }, ageDays: number): Day {
  const months =
    Number(demoToday.slice(0, 4)) * 12 + Number(demoToday.slice(5, 7)) - 1 - age.years * 12 - age.months
  const prefix = `${Math.floor(months / 12)}-${String((months % 12) + 1).padStart(2, '0')}`
  let date = Number(demoToday.slice(8, 10))
  while (!isDay(`${prefix}-${String(date).padStart(2, '0')}`)) date -= 1
  return addDays(`${prefix}-${String(date).padStart(2, '0')}`, -ageDays)
}

/** The moment at which clocks in a time zone show this day and time ('HH:MM'). */
export function demoMoment(day: Day, time: string, timeZone: string): Date {
  const guess = Date.parse(`${day}T${time}:00Z`)
  // Swedish dates are written the way ISO 8601 writes them.
  const shown = new Intl.DateTimeFormat('sv-SE', { timeZone, dateStyle: 'short', timeStyle: 'short' }).format(
    guess,
  )
  return new Date(2 * guess - Date.parse(`${shown.replace(' ', 'T')}:00Z`))
}
