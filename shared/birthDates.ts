import { ageInYears, compareDays, formatDay, type Day } from './days.ts'

/** The clinic sees people until they come of age and finish a course begun before (clinic rule). */
export const oldestYears = 18

/** Why a day cannot be the birth date of somebody this clinic sees on that other day; null when it can. */
export function birthDateProblem(birthDate: Day, on: Day): string | null {
  if (compareDays(birthDate, on) > 0)
    return `The date of birth cannot be after ${formatDay(on)}: check the year`
  const years = ageInYears(birthDate, on)
  if (years > oldestYears)
    return `This date of birth makes the child ${years} years old on ${formatDay(on)}: check the year`
  return null
}

/** Why the two dates of a referral cannot be right, by field; empty when they can. */
export function referralDayProblems(
  { birthDate, receivedOn }: { birthDate: Day; receivedOn: Day },
  today: Day,
): Record<string, string> {
  if (compareDays(receivedOn, today) > 0)
    return { receivedOn: `The date received cannot be in the future: today is ${formatDay(today)}` }
  const problem = birthDateProblem(birthDate, receivedOn)
  return problem === null ? {} : { birthDate: problem }
}

/** Two years wide and never the exact age: '6 to 7 years', 'under 2 years'. For lists that show no name. */
export function ageBand(birthDate: Day, on: Day): string {
  const years = compareDays(birthDate, on) > 0 ? 0 : ageInYears(birthDate, on)
  const from = years - (years % 2)
  return from === 0 ? 'under 2 years' : `${from} to ${from + 1} years`
}
