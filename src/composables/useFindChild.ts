import { onScopeDispose, readonly, ref, shallowRef, watch } from 'vue'
import type { FoundChild } from '@shared/children.ts'
import { childrenApi } from '@/api/children.ts'
import { wordsFor } from '@/composables/problems.ts'

const typingPauseInMs = 200
const shortestSearch = 2

/** Finds children by name or record number while somebody types. Answers arrive in the order of the questions. */
export function useFindChild() {
  const words = ref<string>('')
  const found = shallowRef<FoundChild[] | null>(null)
  const busy = ref<boolean>(false)
  const problem = ref<string | null>(null)
  let pause: ReturnType<typeof setTimeout> | undefined
  let question = 0

  async function ask(q: string): Promise<void> {
    const mine = ++question
    busy.value = true
    try {
      const answer = await childrenApi.find(q)
      if (mine !== question) return
      found.value = answer
      problem.value = null
    } catch (error) {
      if (mine !== question) return
      found.value = null
      problem.value = wordsFor(error)
    } finally {
      if (mine === question) busy.value = false
    }
  }

  const forget = () => {
    clearTimeout(pause)
    question += 1
    busy.value = false
    found.value = null
    problem.value = null
  }

  watch(words, (typed) => {
    const q = typed.trim()
    if (q.length < shortestSearch) {
      forget()
      return
    }
    clearTimeout(pause)
    pause = setTimeout(() => void ask(q), typingPauseInMs)
  })
  onScopeDispose(() => clearTimeout(pause))

  return { words, found: readonly(found), busy: readonly(busy), problem: readonly(problem) }
}
