import { computed, onScopeDispose, readonly, ref, watch } from 'vue'
import { wordsFor } from '@/composables/problems.ts'
import { useSessionStore } from '@/stores/session.ts'

/** The warning comes this long before the server ends the sign-in: at least two minutes are needed to react. */
const warningSeconds = 180
const lookAgainInMs = 20_000

const channel = typeof BroadcastChannel === 'undefined' ? null : new BroadcastChannel('fanflower-session')

/** Tells the other tabs of this browser that somebody signed in or out. */
export const tellOtherTabs = () => channel?.postMessage('changed')

/**
 * Watches the end of the sign-in: warns in time, extends on demand, notices what other tabs did. Activity in another
 * tab also extends, so the server is asked (in the background) before anybody is disturbed.
 */
export function useSessionWatch() {
  const session = useSessionStore()
  const secondsLeft = ref<number | null>(null)
  const extending = ref<boolean>(false)
  const problem = ref<string | null>(null)
  const warning = computed(() => session.signedIn && secondsLeft.value !== null)

  let timer: ReturnType<typeof setTimeout> | undefined
  let asked = -Infinity

  const look = async (extend = false) => {
    asked = performance.now()
    try {
      await session.check({ extend })
      problem.value = null
    } catch (error) {
      // Unreachable: the countdown goes on by the page's own clock.
      if (extend) problem.value = wordsFor(error)
    }
  }

  async function tick(): Promise<void> {
    clearTimeout(timer)
    if (session.endsAt === null || !session.signedIn) {
      secondsLeft.value = null
      return
    }
    const left = () => Math.ceil(((session.endsAt ?? 0) - performance.now()) / 1000)
    if (left() <= warningSeconds && performance.now() - asked > lookAgainInMs) await look()
    if (session.endsAt === null) {
      secondsLeft.value = null
      return
    }
    const near = left() <= warningSeconds
    secondsLeft.value = near ? Math.max(0, left()) : null
    timer = setTimeout(() => void tick(), near ? 1000 : (left() - warningSeconds) * 1000)
  }

  async function extend(): Promise<void> {
    if (extending.value) return
    extending.value = true
    await look(true)
    extending.value = false
    await tick()
  }

  // Timers sleep with the computer and in hidden tabs; a page that is looked at again checks at once.
  const seen = () => {
    if (document.visibilityState !== 'visible' || !session.user) return
    void (performance.now() - asked > lookAgainInMs ? look().then(tick) : tick())
  }
  const heard = () => {
    if (session.user) void look().then(tick)
  }

  watch(
    () => session.endsAt,
    () => void tick(),
    { immediate: true },
  )
  document.addEventListener('visibilitychange', seen)
  channel?.addEventListener('message', heard)
  onScopeDispose(() => {
    clearTimeout(timer)
    document.removeEventListener('visibilitychange', seen)
    channel?.removeEventListener('message', heard)
  })

  return {
    warning,
    secondsLeft: readonly(secondsLeft),
    extending: readonly(extending),
    problem: readonly(problem),
    extend,
  }
}
