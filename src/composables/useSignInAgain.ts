import { readonly, ref } from 'vue'
import { wordsFor } from '@/composables/problems.ts'
import { tellOtherTabs } from '@/composables/useSessionWatch.ts'
import { startAfresh } from '@/composables/useSignOut.ts'
import { useSessionStore } from '@/stores/session.ts'

/** Signing in on a covered page: the same person goes on in it, another person never sees it. */
export function useSignInAgain() {
  const session = useSessionStore()
  const busy = ref<boolean>(false)
  const problem = ref<string | null>(null)

  async function signIn(password: string): Promise<void> {
    const email = session.user?.email
    if (busy.value || email === undefined) return
    if (password === '') {
      problem.value = 'Enter your password'
      return
    }
    busy.value = true
    problem.value = null
    try {
      const who = await session.signIn({ email, password, sharedComputer: false })
      tellOtherTabs()
      if (who === 'other') startAfresh('/')
    } catch (error) {
      problem.value = wordsFor(error)
    } finally {
      busy.value = false
    }
  }

  const leave = () => startAfresh('/')

  return { busy: readonly(busy), problem: readonly(problem), signIn, leave }
}
