import type { CaseloadPage } from '@shared/caseload.ts'
import { http, type ReadOptions } from '@/api/http.ts'

export const caseloadApi = {
  page: (query: ReadOptions['query']) => http.get<CaseloadPage>('/caseload', { query }),
}
