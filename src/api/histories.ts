import { http } from '@/api/http.ts'
import type { HistoryDraft, HistoryStart, HistoryView } from '@shared/histories.ts'

const path = (childId: string) => `/children/${childId}/histories`

export const historiesApi = {
  forChild: (childId: string) => http.get<HistoryView[]>(path(childId)),
  start: (childId: string, start: HistoryStart, idempotencyKey: string) =>
    http.post<HistoryView>(path(childId), start, { idempotencyKey }),
  one: (childId: string, id: string) => http.get<HistoryView>(`${path(childId)}/${id}`),
  save: (childId: string, id: string, draft: HistoryDraft, version: number) =>
    http.put<HistoryView>(`${path(childId)}/${id}`, draft, { ifMatch: version }),
  discard: (childId: string, id: string, version: number) =>
    http.delete<void>(`${path(childId)}/${id}`, undefined, { ifMatch: version }),
  lock: (childId: string, id: string, version: number) =>
    http.post<HistoryView>(`${path(childId)}/${id}/lock`, {}, { ifMatch: version }),
}
