import type { RegisterRow } from '@shared/children.ts'
import type { Page } from '@shared/pages.ts'
import { http, type ReadOptions } from '@/api/http.ts'

/** The administrator's register: identity and contact of every child, no clinical field. */
export const registerApi = {
  page: (query: ReadOptions['query']) => http.get<Page<RegisterRow>>('/children', { query }),
}
