import { http } from '@/api/http.ts'
import type {
  ConclusionCheck,
  ConclusionContent,
  ConclusionStart,
  ConclusionView,
  SignConclusion,
} from '@shared/conclusions.ts'

const path = (childId: string) => `/children/${childId}/conclusions`

export const conclusionsApi = {
  forChild: (childId: string) => http.get<ConclusionView[]>(path(childId)),
  start: (childId: string, start: ConclusionStart, idempotencyKey: string) =>
    http.post<ConclusionView>(path(childId), start, { idempotencyKey }),
  one: (childId: string, id: string) => http.get<ConclusionView>(`${path(childId)}/${id}`),
  save: (childId: string, id: string, content: ConclusionContent, version: number) =>
    http.put<ConclusionView>(`${path(childId)}/${id}`, content, { ifMatch: version }),
  discard: (childId: string, id: string, version: number) =>
    http.delete<void>(`${path(childId)}/${id}`, undefined, { ifMatch: version }),
  /** What stands between the stored draft and its signature. */
  check: (childId: string, id: string) => http.get<ConclusionCheck>(`${path(childId)}/${id}/check`),
  sign: (childId: string, id: string, signature: SignConclusion, version: number) =>
    http.post<ConclusionView>(`${path(childId)}/${id}/sign`, signature, { ifMatch: version }),
  countersign: (childId: string, id: string, signature: SignConclusion, version: number) =>
    http.post<ConclusionView>(`${path(childId)}/${id}/countersign`, signature, { ifMatch: version }),
  reportUrl: (childId: string, id: string) => `/api${path(childId)}/${id}/report.pdf`,
}
