import type { ConsentPurpose } from '@shared/consents.ts'
import type { MyChildRow, MyChildView } from '@shared/family.ts'
import type { OwnContact } from '@shared/guardians.ts'
import type { ReceivedLetter } from '@shared/letters.ts'
import { http } from '@/api/http.ts'

/** What a parent or carer may see and do. */
export const familyApi = {
  children: () => http.get<MyChildRow[]>('/my/children'),
  child: (childId: string) => http.get<MyChildView>(`/my/children/${childId}`),
  updateContact: (childId: string, contact: OwnContact, version: number) =>
    http.put<MyChildView>(`/my/children/${childId}/contact`, contact, { ifMatch: version }),
  giveConsent: (childId: string, purpose: ConsentPurpose) =>
    http.post<void>(`/my/children/${childId}/consents`, { purpose }),
  withdrawConsent: (childId: string, consentId: string, reason: string | null) =>
    http.post<void>(`/my/children/${childId}/consents/${consentId}/withdraw`, { reason }),
  letter: (letterId: string) => http.get<ReceivedLetter>(`/my/letters/${letterId}`),
  letterPdfUrl: (letterId: string) => `/api/my/letters/${letterId}/pdf`,
  delivery: (deliveryId: string) =>
    http.get<{ letterId: string; childId: string }>(`/my/deliveries/${deliveryId}`),
}
