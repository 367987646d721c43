import type { Page } from '@shared/pages.ts'
import type { ClassChoice, SchoolClassDetails, SchoolDetails, SchoolView } from '@shared/schools.ts'
import { http, type ReadOptions } from '@/api/http.ts'

export const schoolsApi = {
  page: (query: ReadOptions['query']) => http.get<Page<SchoolView>>('/schools', { query }),
  classChoices: () => http.get<ClassChoice[]>('/class-choices'),
  create: (details: SchoolDetails, idempotencyKey: string) =>
    http.post<SchoolView>('/schools', details, { idempotencyKey }),
  createClass: (details: SchoolClassDetails, idempotencyKey: string) =>
    http.post<{ id: string }>('/classes', details, { idempotencyKey }),
  updateClass: (id: string, details: SchoolClassDetails, version: number) =>
    http.put<{ id: string }>(`/classes/${id}`, details, { ifMatch: version }),
}
