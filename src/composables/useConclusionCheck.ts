import {
  onScopeDispose,
  readonly,
  ref,
  shallowRef,
  toValue,
  watch,
  type MaybeRefOrGetter,
  type Ref,
} from 'vue'
import type { ConclusionCheck } from '@shared/conclusions.ts'
import { statusOf, wasStopped, wordsFor } from '@/composables/problems.ts'

/**
 * What the record says against a conclusion while it is written. The server compares the stored draft with the whole
 * record, so it is asked anew after every save. An answer that does not come leaves the last one standing, marked old.
 */
export function useConclusionCheck(options: {
  /** Version of the draft as stored. */
  version: MaybeRefOrGetter<number>
  check: () => Promise<ConclusionCheck>
}) {
  const found = shallowRef<ConclusionCheck | null>(null)
  const busy = ref<boolean>(false)
  const problem = ref<string | null>(null)
  let latest = 0

  /** Asks now; true when the answer is about the draft as it is stored. */
  async function ask(): Promise<boolean> {
    latest += 1
    const mine = latest
    busy.value = true
    try {
      const answer = await options.check()
      // An earlier question may be answered last.
      if (mine !== latest) return false
      found.value = answer
      problem.value = null
      return true
    } catch (error) {
      if (mine === latest && !wasStopped(error)) problem.value = wordsFor(error)
      // A fault of the page itself must not pass for a refusal of the server.
      if (statusOf(error) === null && !wasStopped(error)) throw error
      return false
    } finally {
      if (mine === latest) busy.value = false
    }
  }

  watch(
    () => toValue(options.version),
    () => void ask(),
    { immediate: true },
  )
  onScopeDispose(() => (latest += 1))

  return {
    found: found as Readonly<Ref<ConclusionCheck | null>>,
    busy: readonly(busy),
    problem: readonly(problem),
    ask,
  }
}
