import type { Day } from '@shared/days.ts'

/** 2026 is the school year 2026/27. */
export const schoolYearLabel = (firstYear: number): string =>
  `${firstYear}/${String((firstYear + 1) % 100).padStart(2, '0')}`

/** First year of the school year a day lies in; it turns over in August, before any school here begins. */
export const schoolYearOf = (day: Day): number => {
  const year = Number(day.slice(0, 4))
  return day.slice(5, 7) >= '08' ? year : year - 1
}

/** Last, this and next school year, to choose from; `kept` stays choosable however old it is. */
export const schoolYearChoices = (today: Day, kept: number | null = null) => {
  const now = schoolYearOf(today)
  const years = new Set([now - 1, now, now + 1, ...(kept === null ? [] : [kept])])
  return [...years].sort((a, b) => a - b).map((value) => ({ value, label: schoolYearLabel(value) }))
}
