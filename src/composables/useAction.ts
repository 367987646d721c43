import { readonly, ref } from 'vue'
import { statusOf, wasStopped, wordsFor } from '@/composables/problems.ts'

/**
 * One act of a button: busy while it runs, never twice at once, and the refusal in words when it was refused.
 * `run` answers undefined when the act was refused or is under way already.
 */
export function useAction<Args extends unknown[], Answer>(act: (...args: Args) => Promise<Answer>) {
  const busy = ref<boolean>(false)
  const refused = ref<string | null>(null)

  async function run(...args: Args): Promise<Answer | undefined> {
    if (busy.value) return undefined
    busy.value = true
    refused.value = null
    try {
      return await act(...args)
    } catch (error) {
      if (wasStopped(error)) return undefined
      refused.value = wordsFor(error)
      // A fault of the page itself must not pass for a refusal of the server.
      if (statusOf(error) === null) throw error
      return undefined
    } finally {
      busy.value = false
    }
  }

  return { busy: readonly(busy), refused: readonly(refused), run }
}
