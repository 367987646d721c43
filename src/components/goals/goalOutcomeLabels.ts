import type { GoalOutcome } from '@shared/goals.ts'

export const goalOutcomeLabels: Record<GoalOutcome, string> = {
  finished: 'Worked on to the end',
  set_aside: 'Set aside',
}
