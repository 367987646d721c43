import { useQuery } from '@pinia/colada'
import { ref, toValue, watch, type MaybeRefOrGetter } from 'vue'
import { alertsApi } from '@/api/alerts.ts'
import { childKey } from '@/composables/useChild.ts'

/** Warning signs of a child, page by page, for `AlertPanel`. */
export function useAlerts(childId: MaybeRefOrGetter<string>) {
  const page = ref<number>(1)
  watch(
    () => toValue(childId),
    () => {
      page.value = 1
    },
  )
  const alerts = useQuery({
    key: () => childKey(toValue(childId), 'alerts', page.value),
    query: () => alertsApi.forChild(toValue(childId), page.value),
    placeholderData: (previous) => previous,
  })
  return { alerts, page }
}
