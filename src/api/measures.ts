import { http } from '@/api/http.ts'
import type { MeasureDraft, MeasureStart } from '@shared/measureSchemas.ts'
import type { MeasureView } from '@shared/measures.ts'

const path = (childId: string) => `/children/${childId}/measures`

export const measuresApi = {
  forChild: (childId: string) => http.get<MeasureView[]>(path(childId)),
  start: (childId: string, start: MeasureStart, idempotencyKey: string) =>
    http.post<MeasureView>(path(childId), start, { idempotencyKey }),
  one: (childId: string, id: string) => http.get<MeasureView>(`${path(childId)}/${id}`),
  save: (childId: string, id: string, draft: MeasureDraft, version: number) =>
    http.put<MeasureView>(`${path(childId)}/${id}`, draft, { ifMatch: version }),
  discard: (childId: string, id: string, version: number) =>
    http.delete<void>(`${path(childId)}/${id}`, undefined, { ifMatch: version }),
  lock: (childId: string, id: string, version: number) =>
    http.post<MeasureView>(`${path(childId)}/${id}/lock`, {}, { ifMatch: version }),
}
