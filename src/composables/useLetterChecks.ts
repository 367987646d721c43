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
import type { LetterChecks, LetterDraft } from '@shared/letters.ts'
import { statusOf } from '@/composables/problems.ts'

const pauseInMs = 800

/**
 * Checks a letter while it is written, after a short pause. Nothing is stored by it. The server checks because it alone
 * knows the names of other children; a check that does not come back leaves the last one standing, marked as old.
 */
export function useLetterChecks(options: {
  draft: MaybeRefOrGetter<LetterDraft>
  initial: LetterChecks
  check: (draft: LetterDraft) => Promise<LetterChecks>
}) {
  const checks = shallowRef<LetterChecks>(options.initial)
  const old = ref<boolean>(false)
  let pause: ReturnType<typeof setTimeout> | undefined
  let latest = 0

  async function ask(): Promise<void> {
    latest += 1
    const mine = latest
    try {
      const answer = await options.check(toValue(options.draft))
      // An earlier question may be answered last.
      if (mine !== latest) return
      checks.value = answer
      old.value = false
    } catch (error) {
      // Autosave sends the same text and says what is wrong; here it is enough that the notes are marked as old.
      if (statusOf(error) === null) throw error
    }
  }

  watch(
    () => JSON.stringify(toValue(options.draft)),
    () => {
      old.value = true
      clearTimeout(pause)
      pause = setTimeout(() => void ask(), pauseInMs)
    },
  )
  onScopeDispose(() => clearTimeout(pause))

  return { checks: checks as Readonly<Ref<LetterChecks>>, old: readonly(old), ask }
}
