import { http } from '@/api/http.ts'
import type { ConsentGiven, ConsentView, ConsentWithdrawal } from '@shared/consents.ts'

const path = (childId: string) => `/children/${childId}/consents`

export const consentsApi = {
  forChild: (childId: string) => http.get<ConsentView[]>(path(childId)),
  record: (childId: string, consent: ConsentGiven) => http.post<ConsentView>(path(childId), consent),
  withdraw: (childId: string, id: string, withdrawal: ConsentWithdrawal) =>
    http.post<void>(`${path(childId)}/${id}/withdraw`, withdrawal),
}
