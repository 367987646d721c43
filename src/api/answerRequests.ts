import type {
  AnswerChoices,
  AnswerDraft,
  AnswerLink,
  AnswerPage,
  AnswerRequestDetails,
  AnswerRequestPage,
  AnswerRequestView,
  ToAnswer,
} from '@shared/answerRequests.ts'
import { http } from '@/api/http.ts'

const path = (childId: string) => `/children/${childId}/answer-requests`

/** What the clinic asks of carers and teachers. */
export const answerRequestsApi = {
  forChild: (childId: string, page = 1) => http.get<AnswerRequestPage>(path(childId), { query: { page } }),
  choices: (childId: string) => http.get<AnswerChoices>(`/children/${childId}/answer-choices`),
  ask: (childId: string, asked: AnswerRequestDetails, idempotencyKey: string) =>
    http.post<AnswerRequestView>(path(childId), asked, { idempotencyKey }),
  cancel: (childId: string, id: string, version: number) =>
    http.post<void>(`${path(childId)}/${id}/cancel`, {}, { ifMatch: version }),
  remind: (childId: string, id: string) => http.post<void>(`${path(childId)}/${id}/remind`, {}),
}

/** How one person answers what they were asked: signed in as a carer or teacher, or through a link. */
export interface AnswerSide {
  save: (draft: AnswerDraft, version: number) => Promise<AnswerPage>
  send: (version: number) => Promise<void>
}

const signedIn = (page: string): AnswerSide & { open: () => Promise<AnswerPage> } => ({
  open: () => http.get<AnswerPage>(page),
  save: (draft, version) => http.put<AnswerPage>(page, draft, { ifMatch: version }),
  send: (version) => http.post<void>(`${page}/send`, {}, { ifMatch: version }),
})

export const answersApi = {
  asCarer: (childId: string, id: string) => signedIn(`/my/children/${childId}/answer-requests/${id}`),
  asTeacher: (childId: string, id: string) => signedIn(`/pupils/${childId}/answer-requests/${id}`),
  toAnswerAsCarer: () => http.get<ToAnswer[]>('/my/to-answer'),
  toAnswerAsTeacher: () => http.get<ToAnswer[]>('/pupils/to-answer'),
  openLink: (link: AnswerLink) => http.post<AnswerPage>('/answer-links/open', link),
  byLink: (link: AnswerLink): AnswerSide => ({
    save: (draft, version) => http.put<AnswerPage>('/answer-links', { ...link, version, ...draft }),
    send: (version) => http.post<void>('/answer-links/send', { ...link, version }),
  }),
}
