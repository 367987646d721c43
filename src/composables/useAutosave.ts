import {
  computed,
  nextTick,
  onScopeDispose,
  readonly,
  ref,
  shallowRef,
  toValue,
  watch,
  type MaybeRefOrGetter,
  type Ref,
} from 'vue'
import type { Problem } from '@shared/problems.ts'
import { HttpProblem } from '@/api/http.ts'
import { wordsFor } from '@/composables/problems.ts'
import { useLeaveGuard } from '@/composables/useLeaveGuard.ts'
import { useSessionStore } from '@/stores/session.ts'

export type AutosaveState = 'idle' | 'saving' | 'saved' | 'failed' | 'conflict'

interface AutosaveOptions<Value, Answer extends { version: number }> {
  /** What is being written. Read deeply; the page keeps it, never web storage. */
  value: MaybeRefOrGetter<Value>
  /** Version the page was loaded with. Saves count on from there. */
  version: MaybeRefOrGetter<number>
  save: (value: Value, version: number) => Promise<Answer>
  /** Milliseconds of quiet before a save; 3 seconds when left out. */
  delay?: number
  /** False switches saving off, e.g. once a note is signed. */
  enabled?: MaybeRefOrGetter<boolean>
  saved?: (answer: Answer) => void
}

/** Somebody who never pauses is still saved this often. */
const longestWaitInMs = 15_000
const retryWaitsInMs = [5_000, 10_000, 30_000]

/**
 * Keeps a draft on the server while somebody writes. One save at a time, in order. When the network fails or the
 * sign-in ends it tries again by itself; a 409 `stale` stops it until `resolve` says which text stays.
 */
export function useAutosave<Value, Answer extends { version: number }>(
  options: AutosaveOptions<Value, Answer>,
) {
  const state = ref<AutosaveState>('idle')
  const savedAt = shallowRef<Date | null>(null)
  const problem = shallowRef<Problem | null>(null)
  const conflict = shallowRef<{ mine: Value; theirs: Answer } | null>(null)
  const session = useSessionStore()

  const textOf = (value: Value) => JSON.stringify(value)
  const now = () => toValue(options.value)
  const enabled = () => toValue(options.enabled ?? true)
  const kept: Ref<string> = ref(textOf(now()))
  const pending = computed(() => enabled() && textOf(now()) !== kept.value)

  let version = toValue(options.version)
  let quiet: ReturnType<typeof setTimeout> | undefined
  let deadline: ReturnType<typeof setTimeout> | undefined
  let retry: ReturnType<typeof setTimeout> | undefined
  let tries = 0
  let running: Promise<boolean> | null = null

  const stopTimers = () => {
    clearTimeout(quiet)
    clearTimeout(deadline)
    clearTimeout(retry)
    quiet = deadline = retry = undefined
  }

  function fail(error: unknown): void {
    if (!(error instanceof HttpProblem)) {
      state.value = 'failed'
      problem.value = { code: 'unexpected', message: wordsFor(error), requestId: '' }
      return
    }
    problem.value = error.problem
    if (error.status === 409 && error.problem.code === 'stale' && error.problem.current) {
      conflict.value = { mine: JSON.parse(textOf(now())) as Value, theirs: error.problem.current as Answer }
      state.value = 'conflict'
      return
    }
    state.value = 'failed'
    // These pass by themselves; a refused text does not, and an ended sign-in waits for the person.
    if (error.status === 0 || error.status === 429 || error.status >= 500) {
      const patience = retryWaitsInMs[Math.min(tries, retryWaitsInMs.length - 1)] ?? longestWaitInMs
      tries += 1
      retry = setTimeout(() => void flush(), Math.max(patience, (error.retryAfter ?? 0) * 1000))
    }
  }

  async function saveOnce(): Promise<boolean> {
    const text = textOf(now())
    state.value = 'saving'
    try {
      const answer = await options.save(JSON.parse(text) as Value, version)
      version = answer.version
      kept.value = text
      savedAt.value = new Date()
      problem.value = null
      state.value = 'saved'
      tries = 0
      options.saved?.(answer)
      return true
    } catch (error) {
      fail(error)
      return false
    }
  }

  /** One save at a time; what was typed meanwhile waits for the next quiet moment. */
  function run(): Promise<boolean> {
    if (!running) {
      stopTimers()
      running = (pending.value ? saveOnce() : Promise.resolve(true)).finally(() => {
        running = null
        if (state.value === 'saved') schedule()
      })
    }
    return running
  }

  /** Saves now whatever is not saved yet, and waits for it. Look at `state` afterwards. */
  async function flush(): Promise<void> {
    if (running) await running
    while (pending.value && state.value !== 'conflict') {
      if (!(await run())) return
    }
  }

  function schedule(): void {
    if (!pending.value || state.value === 'conflict') return
    clearTimeout(quiet)
    quiet = setTimeout(() => void run(), options.delay ?? 3_000)
    deadline ??= setTimeout(() => void run(), longestWaitInMs)
  }

  /**
   * Ends a conflict. `mine` saves this page's text over the other; `theirs` takes the other as the saved one: the
   * answer is what is stored now; the caller puts it and its version into the page and calls `rebase()`.
   */
  async function resolve(choice: 'mine' | 'theirs'): Promise<Answer | null> {
    const open = conflict.value
    if (!open) return null
    version = open.theirs.version
    conflict.value = null
    problem.value = null
    state.value = 'idle'
    if (choice === 'mine') await flush()
    return open.theirs
  }

  /** The form was filled anew (loaded, or taken from a conflict): this is the saved text now. */
  async function rebase(): Promise<void> {
    await nextTick()
    stopTimers()
    version = toValue(options.version)
    kept.value = textOf(now())
    state.value = 'idle'
  }

  watch(() => (enabled() ? textOf(now()) : null), schedule)
  watch(
    () => session.resumed,
    () => void flush(),
  )
  const online = () => void flush()
  const hidden = () => {
    if (document.visibilityState === 'hidden') void flush()
  }
  window.addEventListener('online', online)
  document.addEventListener('visibilitychange', hidden)
  useLeaveGuard(() => pending.value, flush)

  onScopeDispose(() => {
    stopTimers()
    window.removeEventListener('online', online)
    document.removeEventListener('visibilitychange', hidden)
  })

  return {
    state: readonly(state),
    savedAt: readonly(savedAt) as Readonly<Ref<Date | null>>,
    problem: problem as Readonly<Ref<Problem | null>>,
    conflict: conflict as Readonly<Ref<{ mine: Value; theirs: Answer } | null>>,
    pending,
    flush,
    resolve,
    rebase,
  }
}
