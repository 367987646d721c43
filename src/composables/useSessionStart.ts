import { computed } from 'vue'
import { useToday } from '@/composables/useToday.ts'
import { useSessionStore } from '@/stores/session.ts'

/** When a session that is being written up now most likely began, on the clinic's wall clock. */
export function useSessionStart() {
  const session = useSessionStore()
  const today = useToday()
  // Back to the last five minutes: a session starts on a round time.
  const startTime = computed(() => {
    const five = 5 * 60_000
    return new Intl.DateTimeFormat('en-GB', {
      hour: '2-digit',
      minute: '2-digit',
      hourCycle: 'h23',
      timeZone: session.clinic?.timeZone ?? 'UTC',
    }).format(new Date(Math.floor(Date.now() / five) * five))
  })
  return { today, startTime }
}
