import { readonly, ref } from 'vue'
import { statusOf, wordsFor } from '@/composables/problems.ts'
import { leaveWithoutAsking, mayLeave } from '@/composables/useLeaveGuard.ts'
import { tellOtherTabs } from '@/composables/useSessionWatch.ts'
import { useSessionStore } from '@/stores/session.ts'

/** A fresh page load forgets everything this page held in memory, also for the browser's way back. */
export const startAfresh = (address: string) => {
  leaveWithoutAsking()
  window.location.replace(address)
}

/** Looks and keys chosen for this device: the server's order to clear storage at sign-out does not mean them. */
const deviceSettings = () => Object.entries(localStorage).filter(([key]) => key.startsWith('fanflower.'))

/** Signs out: saves or asks about what is unsaved, ends the sign-in on the server, then forgets the page. */
export function useSignOut() {
  const session = useSessionStore()
  const problem = ref<string | null>(null)

  async function signOut(): Promise<void> {
    problem.value = null
    if (!(await mayLeave())) return
    const kept = deviceSettings()
    try {
      await session.signOut()
      for (const [key, value] of kept) localStorage.setItem(key, String(value))
    } catch (error) {
      if (statusOf(error) !== 401) {
        problem.value = `You are still signed in. ${wordsFor(error)}`
        return
      }
    }
    tellOtherTabs()
    startAfresh('/sign-in')
  }

  return { signOut, problem: readonly(problem) }
}
