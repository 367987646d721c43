import { compareDays, formatDay, type Day } from './days.ts'

interface RecordedLife {
  birthDate: Day
  today: Day
}

/** Why a day cannot be the one by which something is hoped for; null when it can. */
export const targetDayProblem = (label: string, day: Day, today: Day): string | null =>
  compareDays(day, today) > 0 ? null : `${label} must come after today (${formatDay(today)})`

/** Why a day cannot be the day something was seen, answered or written down; null when it can. */
export function pastDayProblem(label: string, day: Day, { birthDate, today }: RecordedLife): string | null {
  if (compareDays(day, today) > 0) return `${label} cannot be in the future: today is ${formatDay(today)}`
  if (compareDays(day, birthDate) < 0)
    return `${label} cannot be before the child was born (${formatDay(birthDate)}): check the year`
  return null
}
