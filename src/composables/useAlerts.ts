import { useQuery } from '@pinia/colada'
import { toValue, type MaybeRefOrGetter } from 'vue'
import { alertsApi } from '@/api/alerts.ts'
import { childKey } from '@/composables/useChild.ts'

/** Every warning sign of a child, for `AlertPanel`. */
export const useAlerts = (childId: MaybeRefOrGetter<string>) =>
  useQuery({
    key: () => childKey(toValue(childId), 'alerts'),
    query: () => alertsApi.forChild(toValue(childId)),
  })
