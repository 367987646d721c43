import { useQuery } from '@pinia/colada'
import { toValue, type MaybeRefOrGetter } from 'vue'
import { answerRequestsApi } from '@/api/answerRequests.ts'
import { conclusionsApi } from '@/api/conclusions.ts'
import { handProfileApi } from '@/api/handProfile.ts'
import { historiesApi } from '@/api/histories.ts'
import { useAlerts } from '@/composables/useAlerts.ts'
import { childKey } from '@/composables/useChild.ts'

/** Everything the hand profile is put together from; each part loads, fails and retries by itself. */
export function useHandProfile(child: MaybeRefOrGetter<string>) {
  const childId = () => toValue(child)
  const part = <T>(name: string, query: (id: string) => Promise<T>) =>
    useQuery({ key: () => childKey(childId(), name), query: () => query(childId()) })
  return {
    profile: part('hand-profile', handProfileApi.forChild),
    histories: part('histories', historiesApi.forChild),
    // The first page, as `useAnswerRequests` asks for it: its counts are those of the whole record.
    requests: useQuery({
      key: () => childKey(childId(), 'answer-requests', 1),
      query: () => answerRequestsApi.forChild(childId(), 1),
    }),
    ...useAlerts(childId),
    conclusions: part('conclusions', conclusionsApi.forChild),
  }
}
