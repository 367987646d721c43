import { isDay, type Day } from '@shared/days.ts'

/** A remembered date as three boxes hold it, exactly as typed. */
export interface TypedDay {
  day: string
  month: string
  year: string
}

const monthNames = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec']

/** '3' and '03' are March, and so are 'Mar' and 'march'; anything else is left as typed for the check to name. */
const monthNumber = (typed: string): string => {
  const named = monthNames.indexOf(typed.slice(0, 3).toLowerCase())
  return named < 0 ? typed : String(named + 1)
}

// An empty box stays empty: '00' would be refused as a wrong month instead of a missing one.
const twoDigits = (typed: string): string => (typed === '' ? '' : typed.padStart(2, '0'))

/**
 * The three boxes as one value for the form: null when all are empty, a calendar day when they make one, and otherwise
 * the unfinished text, which the schema refuses with what is wrong. Nothing typed is thrown away.
 */
export function joinTypedDay({ day, month, year }: TypedDay): Day | null {
  const typed = [year.trim(), monthNumber(month.trim()), day.trim()] as const
  if (typed.every((part) => part === '')) return null
  const [y, m, d] = typed
  return [y, twoDigits(m), twoDigits(d)].join('-')
}

/** The boxes for a stored day; null or an unfinished text gives empty boxes. */
export function splitDay(value: Day | null): TypedDay {
  if (!isDay(value)) return { day: '', month: '', year: '' }
  return {
    day: String(Number(value.slice(8))),
    month: String(Number(value.slice(5, 7))),
    year: value.slice(0, 4),
  }
}
