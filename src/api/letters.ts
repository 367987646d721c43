import { http, type ReadOptions } from '@/api/http.ts'
import type {
  LetterApproval,
  LetterChecks,
  LetterDraft,
  LetterPage,
  LetterReturn,
  LetterSend,
  LetterView,
} from '@shared/letters.ts'

const path = (childId: string) => `/children/${childId}/letters`

export const lettersApi = {
  /** A therapist's own letters; all of them for a lead. */
  list: (query: ReadOptions['query']) => http.get<LetterPage>('/letters', { query }),
  forChild: (childId: string, query: ReadOptions['query']) => http.get<LetterPage>(path(childId), { query }),
  assemble: (childId: string, idempotencyKey: string) =>
    http.post<LetterView>(path(childId), { kind: 'progress' }, { idempotencyKey }),
  one: (childId: string, id: string) => http.get<LetterView>(`${path(childId)}/${id}`),
  save: (childId: string, id: string, draft: LetterDraft, version: number) =>
    http.put<LetterView>(`${path(childId)}/${id}`, draft, { ifMatch: version }),
  discard: (childId: string, id: string, version: number) =>
    http.delete<void>(`${path(childId)}/${id}`, undefined, { ifMatch: version }),
  check: (childId: string, id: string, draft: LetterDraft) =>
    http.post<LetterChecks>(`${path(childId)}/${id}/check`, draft),
  submit: (childId: string, id: string, version: number) =>
    http.post<LetterView>(`${path(childId)}/${id}/submit`, {}, { ifMatch: version }),
  approve: (childId: string, id: string, approval: LetterApproval, version: number) =>
    http.post<LetterView>(`${path(childId)}/${id}/approve`, approval, { ifMatch: version }),
  return: (childId: string, id: string, returned: LetterReturn, version: number) =>
    http.post<LetterView>(`${path(childId)}/${id}/return`, returned, { ifMatch: version }),
  takeBack: (childId: string, id: string, version: number) =>
    http.post<LetterView>(`${path(childId)}/${id}/take-back`, {}, { ifMatch: version }),
  send: (childId: string, id: string, sending: LetterSend, version: number) =>
    http.post<LetterView>(`${path(childId)}/${id}/send`, sending, { ifMatch: version }),
  recall: (childId: string, id: string, version: number) =>
    http.post<LetterView>(`${path(childId)}/${id}/recall`, {}, { ifMatch: version }),
  retry: (childId: string, id: string, deliveryId: string) =>
    http.post<LetterView>(`${path(childId)}/${id}/deliveries/${deliveryId}/retry`),
  pdfUrl: (childId: string, id: string) => `/api${path(childId)}/${id}/pdf`,
}
