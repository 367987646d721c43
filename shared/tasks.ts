import type { Attention } from './attention.ts'
import { addDays, compareDays, type Day } from './days.ts'

/** Kind of the task that a warning sign gives: it is done by answering the sign, not by ticking it off. */
export const alertTask = 'red_flag'

/** Kind of the task to countersign a conclusion: the countersignature does it. */
export const conclusionTask = 'conclusion_to_countersign'

/** Tasks that are done by an act on the record, with what that act is; nobody ticks them off. */
const doneByAct: Readonly<Record<string, string>> = {
  [alertTask]:
    'Open the record and write down what was done about the warning sign. This task is then done by itself.',
  [conclusionTask]:
    'Open the record, read the conclusion and countersign it. This task is then done by itself.',
}

/** The act on the record that does a task of this kind, in words; null when it is ticked off. */
export const actOfTask = (kind: string): string | null => doneByAct[kind] ?? null

/** How pressing a task is: overdue once its day has passed, due on the day, soon before it or without a day. */
export function dueLevel(dueOn: Day | null, today: Day): Attention {
  if (dueOn === null) return 'soon'
  const order = compareDays(dueOn, today)
  return order < 0 ? 'overdue' : order === 0 ? 'due' : 'soon'
}

/** Days before a review in which it is shown as coming (clinic rule). */
export const reviewNoticeDays = 14

/** Days over a review's date after which the clinic lead is told (clinic rule). */
export const reviewEscalationDays = 28

/** How pressing a review is; null when none is set or it is further away than the notice. */
export function reviewLevel(nextReviewOn: Day | null, today: Day): Attention | null {
  if (nextReviewOn === null) return null
  if (compareDays(nextReviewOn, addDays(today, reviewNoticeDays)) > 0) return null
  return dueLevel(nextReviewOn, today)
}
