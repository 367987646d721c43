import { http } from '@/api/http.ts'
import type { AccessPage } from '@shared/auditEntries.ts'

export const auditEntriesApi = {
  forChild: (childId: string, query: { page?: number; size?: number }) =>
    http.get<AccessPage>(`/children/${childId}/access-history`, { query }),
}
