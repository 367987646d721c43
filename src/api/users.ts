import type { Page } from '@shared/pages.ts'
import type { StaffInvitation, TherapistChoice, UserChange, UserRow } from '@shared/users.ts'
import { http, type ReadOptions } from '@/api/http.ts'

export const usersApi = {
  page: (query: ReadOptions['query']) => http.get<Page<UserRow>>('/users', { query }),
  therapists: () => http.get<TherapistChoice[]>('/therapists'),
  invite: (invitation: StaffInvitation, idempotencyKey: string) =>
    http.post<UserRow>('/invitations', invitation, { idempotencyKey }),
  update: (id: string, change: UserChange, version: number) =>
    http.patch<UserRow>(`/users/${id}`, change, { ifMatch: version }),
  disable: (id: string) => http.post<void>(`/users/${id}/disable`),
  enable: (id: string) => http.post<void>(`/users/${id}/enable`),
}
