import { http } from '@/api/http.ts'
import type { FormEdition } from '@shared/formEditions.ts'
import type { FormView } from '@shared/forms.ts'

export const formsApi = {
  all: () => http.get<FormView[]>('/forms'),
  makeEdition: (edition: FormEdition) => http.post<FormView>('/forms', edition),
  retire: (id: string) => http.post<FormView>(`/forms/${id}/retire`, {}),
  restore: (id: string) => http.post<FormView>(`/forms/${id}/restore`, {}),
}
