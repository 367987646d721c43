import { http, type ReadOptions } from '@/api/http.ts'
import type { AccessPage } from '@shared/auditEntries.ts'

export const auditEntriesApi = {
  forChild: (childId: string, query: ReadOptions['query']) =>
    http.get<AccessPage>(`/children/${childId}/access-history`, { query }),
}
