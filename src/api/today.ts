import type { TodayView } from '@shared/today.ts'
import { http } from '@/api/http.ts'

export const todayApi = {
  get: () => http.get<TodayView>('/today'),
  finishTask: (taskId: string) => http.post<void>(`/tasks/${taskId}/finish`),
}
