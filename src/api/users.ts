import { maximumPageSize, type Page } from '@shared/pages.ts'
import type { StaffInvitation, TherapistChoice, UserChange, UserRow } from '@shared/users.ts'
import { http, type ReadOptions } from '@/api/http.ts'

const pageOfUsers = (query: ReadOptions['query']) => http.get<Page<UserRow>>('/users', { query })

/** Every teacher, page after page: a choice from which one is missing is a wrong choice. */
async function everyTeacher(): Promise<UserRow[]> {
  const found: UserRow[] = []
  for (let page = 1; ; page += 1) {
    const { rows, total } = await pageOfUsers({ role: 'teacher', size: maximumPageSize, page })
    found.push(...rows)
    if (rows.length === 0 || found.length >= total) return found
  }
}

export const usersApi = {
  page: pageOfUsers,
  teachers: everyTeacher,
  therapists: () => http.get<TherapistChoice[]>('/therapists'),
  invite: (invitation: StaffInvitation, idempotencyKey: string) =>
    http.post<UserRow>('/invitations', invitation, { idempotencyKey }),
  update: (id: string, change: UserChange, version: number) =>
    http.patch<UserRow>(`/users/${id}`, change, { ifMatch: version }),
  disable: (id: string) => http.post<void>(`/users/${id}/disable`),
  enable: (id: string) => http.post<void>(`/users/${id}/enable`),
}
