import { http } from '@/api/http.ts'
import type { GoalDetails, GoalEnd, GoalRating, GoalsView, GoalView } from '@shared/goals.ts'

const path = (childId: string) => `/children/${childId}/goals`

export const goalsApi = {
  forChild: (childId: string) => http.get<GoalsView>(path(childId)),
  set: (childId: string, goal: GoalDetails, idempotencyKey: string) =>
    http.post<GoalView>(path(childId), goal, { idempotencyKey }),
  rate: (childId: string, id: string, rating: GoalRating, idempotencyKey: string) =>
    http.post<GoalView>(`${path(childId)}/${id}/ratings`, rating, { idempotencyKey }),
  end: (childId: string, id: string, ending: GoalEnd, version: number) =>
    http.post<void>(`${path(childId)}/${id}/end`, ending, { ifMatch: version }),
}
