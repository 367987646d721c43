import { computed, inject, ref } from 'vue'
import { routeLocationKey, routerKey } from 'vue-router'

/**
 * The place in a sequence of pages within one address, kept in `?step=`: the browser's back button goes to the page
 * before, and a reload stays where one was. `first` is where one begins without it. Steps count from 0.
 */
export function useSteps(count: () => number, first = 0) {
  // Absent only where a component stands alone, without the app around it.
  const router = inject(routerKey, null)
  const route = inject(routeLocationKey, null)
  const alone = ref<number>(first)
  const asked = computed(() => {
    const given = route?.query.step
    return typeof given === 'string' && /^\d{1,3}$/.test(given) ? Number(given) : null
  })
  const step = computed(() => Math.min(router === null ? alone.value : (asked.value ?? first), count() - 1))

  async function go(to: number): Promise<void> {
    const next = Math.max(0, Math.min(to, count() - 1))
    if (router === null || route === null) alone.value = next
    else await router.push({ query: { ...route.query, step: String(next) } })
  }
  return { step, go }
}
