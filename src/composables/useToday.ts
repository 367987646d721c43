import { computed } from 'vue'
import { dayOf, type Day } from '@shared/days.ts'
import { useSessionStore } from '@/stores/session.ts'

/** The calendar day in the clinic's time zone, as the server said it when this page was made. */
export function useToday() {
  const session = useSessionStore()
  return computed<Day>(() => session.clinic?.today ?? dayOf(new Date(), 'UTC'))
}
