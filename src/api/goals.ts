import { http } from '@/api/http.ts'
import type { GoalDetails, GoalRating, GoalsView, GoalView } from '@shared/goals.ts'

const path = (childId: string) => `/children/${childId}/goals`

export const goalsApi = {
  forChild: (childId: string) => http.get<GoalsView>(path(childId)),
  set: (childId: string, goal: GoalDetails) => http.post<GoalView>(path(childId), goal),
  rate: (childId: string, id: string, rating: GoalRating) =>
    http.post<GoalView>(`${path(childId)}/${id}/ratings`, rating),
  end: (childId: string, id: string, ending: { outcome: 'finished' | 'set_aside'; reason: string }) =>
    http.post<void>(`${path(childId)}/${id}/end`, ending),
}
