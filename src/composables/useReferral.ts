import { useQuery, useQueryCache } from '@pinia/colada'
import { toValue, type MaybeRefOrGetter } from 'vue'
import type { AcceptReferral, DeclineReferral, ReferralDetails } from '@shared/referrals.ts'
import { referralsApi } from '@/api/referrals.ts'

/** One referral and the three things that are done with it; what was read before is asked for again after each. */
export function useReferral(id: MaybeRefOrGetter<string>) {
  const cache = useQueryCache()
  const referral = useQuery({
    key: () => ['referral', toValue(id)],
    query: () => referralsApi.byId(toValue(id)),
  })
  const refresh = async () => {
    await Promise.all([
      cache.invalidateQueries({ key: ['referral', toValue(id)] }),
      cache.invalidateQueries({ key: ['referrals'] }),
      cache.invalidateQueries({ key: ['caseload'] }),
    ])
  }
  return {
    referral,
    refresh,
    change: (details: ReferralDetails, version: number) => referralsApi.update(toValue(id), details, version),
    accept: (decision: AcceptReferral, version: number) =>
      referralsApi.accept(toValue(id), decision, version),
    decline: (decision: DeclineReferral, version: number) =>
      referralsApi.decline(toValue(id), decision, version),
  }
}
