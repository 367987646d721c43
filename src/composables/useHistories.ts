import { useQuery } from '@pinia/colada'
import { toValue, type MaybeRefOrGetter } from 'vue'
import { historiesApi } from '@/api/histories.ts'
import { childKey } from '@/composables/useChild.ts'

/** Every history of a child, for `HistoryList`. */
export const useHistories = (childId: MaybeRefOrGetter<string>) =>
  useQuery({
    key: () => childKey(toValue(childId), 'histories'),
    query: () => historiesApi.forChild(toValue(childId)),
  })
