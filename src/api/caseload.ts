import type { CaseloadPage, CaseloadQuery } from '@shared/caseload.ts'
import { http } from './http.ts'

export const caseloadApi = {
  page: (query: CaseloadQuery) => http.get<CaseloadPage>('/caseload', { query: { ...query } }),
}
