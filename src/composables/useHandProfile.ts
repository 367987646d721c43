import { useQuery } from '@pinia/colada'
import { toValue, type MaybeRefOrGetter } from 'vue'
import { conclusionsApi } from '@/api/conclusions.ts'
import { handProfileApi } from '@/api/handProfile.ts'
import { childKey } from '@/composables/useChild.ts'

/** Everything the hand profile is put together from; each part loads, fails and retries by itself. */
export function useHandProfile(childId: MaybeRefOrGetter<string>) {
  const id = () => toValue(childId)
  const profile = useQuery({
    key: () => childKey(id(), 'hand-profile'),
    query: () => handProfileApi.forChild(id()),
  })
  const conclusions = useQuery({
    key: () => childKey(id(), 'conclusions'),
    query: () => conclusionsApi.forChild(id()),
  })
  return { profile, conclusions }
}
