import type {
  AcceptReferral,
  DeclineReferral,
  PossibleDuplicate,
  ReferralDetails,
  ReferralPage,
  ReferralView,
} from '@shared/referrals.ts'
import type { Day } from '@shared/days.ts'
import { http, type ReadOptions } from '@/api/http.ts'

/** Who a referral is about, as far as a duplicate can be told. */
export interface SameChildQuestion {
  givenName: string
  familyName: string
  birthDate: Day
}

export const referralsApi = {
  page: (query: ReadOptions['query']) => http.get<ReferralPage>('/referrals', { query }),
  byId: (id: string) => http.get<ReferralView>(`/referrals/${id}`),
  create: (details: ReferralDetails, idempotencyKey: string) =>
    http.post<ReferralView>('/referrals', details, { idempotencyKey }),
  update: (id: string, details: ReferralDetails, version: number) =>
    http.put<ReferralView>(`/referrals/${id}`, details, { ifMatch: version }),
  duplicates: (question: SameChildQuestion) =>
    http.get<PossibleDuplicate[]>('/referrals/duplicates', { query: { ...question } }),
  accept: (id: string, decision: AcceptReferral, version: number) =>
    http.post<{ childId: string }>(`/referrals/${id}/accept`, decision, { ifMatch: version }),
  decline: (id: string, decision: DeclineReferral, version: number) =>
    http.post<ReferralView>(`/referrals/${id}/decline`, decision, { ifMatch: version }),
}
