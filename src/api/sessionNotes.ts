import { http, type ReadOptions } from '@/api/http.ts'
import type {
  Addendum,
  NoteDraft,
  NotePage,
  NoteRevisionView,
  NoteView,
  SignNote,
} from '@shared/sessionNotes.ts'

const path = (childId: string) => `/children/${childId}/session-notes`

export const sessionNotesApi = {
  forChild: (childId: string, query: ReadOptions['query']) => http.get<NotePage>(path(childId), { query }),
  start: (childId: string, draft: NoteDraft, idempotencyKey: string) =>
    http.post<NoteView>(path(childId), draft, { idempotencyKey }),
  one: (childId: string, id: string) => http.get<NoteView>(`${path(childId)}/${id}`),
  save: (childId: string, id: string, draft: NoteDraft, version: number) =>
    http.put<NoteView>(`${path(childId)}/${id}`, draft, { ifMatch: version }),
  discard: (childId: string, id: string) => http.delete<void>(`${path(childId)}/${id}`),
  revisions: (childId: string, id: string) =>
    http.get<NoteRevisionView[]>(`${path(childId)}/${id}/revisions`),
  sign: (childId: string, id: string, signature: SignNote, version: number) =>
    http.post<NoteView>(`${path(childId)}/${id}/sign`, signature, { ifMatch: version }),
  countersign: (childId: string, id: string, version: number) =>
    http.post<NoteView>(`${path(childId)}/${id}/countersign`, {}, { ifMatch: version }),
  addAddendum: (childId: string, id: string, addendum: Addendum, idempotencyKey: string) =>
    http.post<NoteView>(`${path(childId)}/${id}/addenda`, addendum, { idempotencyKey }),
}
