import { http } from '@/api/http.ts'
import type { ChildSchoolView, PublishAdvice } from '@shared/schoolAdvice.ts'

export const schoolAdviceApi = {
  forChild: (childId: string) => http.get<ChildSchoolView>(`/children/${childId}/school`),
  publish: (childId: string, advice: PublishAdvice, idempotencyKey: string) =>
    http.post<ChildSchoolView>(`/children/${childId}/advice`, advice, { idempotencyKey }),
  end: (childId: string, id: string) => http.post<void>(`/children/${childId}/advice/${id}/end`),
}
