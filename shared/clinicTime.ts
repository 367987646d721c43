import { dayOf, isDay, type Day } from './days.ts'

const msPerMinute = 60_000
const msPerDay = 86_400_000

const wallClocks = new Map<string, Intl.DateTimeFormat>()

const wallClockOf = (timeZone: string): Intl.DateTimeFormat => {
  let format = wallClocks.get(timeZone)
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', {
      timeZone,
      calendar: 'iso8601',
      hourCycle: 'h23',
      year: 'numeric',
      month: '2-digit',
      day: '2-digit',
      hour: '2-digit',
      minute: '2-digit',
      second: '2-digit',
    })
    wallClocks.set(timeZone, format)
  }
  return format
}

/** What the clock on the wall shows at a moment, read as if it were UTC, in ms. */
const wallMs = (moment: number, timeZone: string): number => {
  const parts = new Map(
    wallClockOf(timeZone)
      .formatToParts(new Date(moment))
      .map((part) => [part.type, Number(part.value)]),
  )
  const part = (type: Intl.DateTimeFormatPartTypes) => parts.get(type) ?? Number.NaN
  return Date.UTC(part('year'), part('month') - 1, part('day'), part('hour'), part('minute'), part('second'))
}

/**
 * The moment at which the wall clock of a time zone shows this day and time ('14:05').
 * In the night when clocks go back a time happens twice: the first is meant. In the night when they go forward a time
 * is missing: the moment as far after the change is meant, as iCalendar (RFC 5545, 3.3.5) has it for both cases.
 * Throws RangeError for a day or time that cannot be.
 */
export function momentOf(day: Day, time: string, timeZone: string): Date {
  if (!isDay(day) || !/^([01]\d|2[0-3]):[0-5]\d$/.test(time))
    throw new RangeError(`Not a day and time: ${day} ${time}`)
  const wanted = Date.parse(`${day}T${time}:00Z`)
  // Zones change their distance to UTC at most once within two days around a moment.
  const before = wallMs(wanted - msPerDay, timeZone) - (wanted - msPerDay)
  const after = wallMs(wanted + msPerDay, timeZone) - (wanted + msPerDay)
  const candidates = [wanted - before, wanted - after].sort((a, b) => a - b)
  const match = candidates.find((candidate) => wallMs(candidate, timeZone) === wanted)
  return new Date(match ?? wanted - before)
}

/** When a session that began at this wall-clock time was over: minutes are real minutes, whatever the clocks do. */
export const sessionEnd = (
  session: { heldOn: Day; startTime: string; minutes: number },
  timeZone: string,
): Date =>
  new Date(momentOf(session.heldOn, session.startTime, timeZone).getTime() + session.minutes * msPerMinute)

/** Is something written down on a later day, by the clinic's calendar, than the day it happened? */
export const isLateEntry = (heldOn: Day, writtenAt: Date, timeZone: string): boolean =>
  dayOf(writtenAt, timeZone) > heldOn
