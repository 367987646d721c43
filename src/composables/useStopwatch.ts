import { onScopeDispose, readonly, ref } from 'vue'

interface StopwatchOptions {
  /** Seconds after which it stops by itself; null lets it run until `stop`. */
  limit?: () => number | null
  /** Called once when the limit is reached. */
  ended?: () => void
}

const shownEveryMs = 100

/** Seconds to a tenth, as a person reads them from a watch. */
export const tenths = (seconds: number): number => Math.round(seconds * 10) / 10

/**
 * A stopwatch on `performance.now`, which neither a changed clock nor a summer time can move. What is shown follows
 * ten times a second; what `stop` answers is read at that moment.
 */
export function useStopwatch({ limit = () => null, ended = () => {} }: StopwatchOptions = {}) {
  const running = ref<boolean>(false)
  const seconds = ref<number>(0)
  let startedAt = 0
  let ticking: ReturnType<typeof setInterval> | undefined

  const read = () => (performance.now() - startedAt) / 1000
  const halt = () => {
    clearInterval(ticking)
    ticking = undefined
    running.value = false
  }
  /** Is the time over? Asked at each tap too: a tap between two ticks must not slip in after the end. */
  const isOver = () => {
    const end = limit()
    return end !== null && read() >= end
  }
  const finish = () => {
    halt()
    seconds.value = limit() ?? read()
    ended()
  }

  function start(): void {
    if (running.value) return
    startedAt = performance.now()
    seconds.value = 0
    running.value = true
    ticking = setInterval(() => {
      if (isOver()) finish()
      else seconds.value = read()
    }, shownEveryMs)
  }

  /** Stops and gives the seconds since `start`, to a tenth. Null when it was not running. */
  function stop(): number | null {
    if (!running.value) return null
    const end = limit()
    const taken = end === null ? read() : Math.min(read(), end)
    halt()
    seconds.value = taken
    return tenths(taken)
  }

  /** Back to zero without a result. */
  function clear(): void {
    halt()
    seconds.value = 0
  }

  /** True while the time runs; ends it first when the limit has passed meanwhile. */
  function stillRuns(): boolean {
    if (running.value && isOver()) finish()
    return running.value
  }

  onScopeDispose(halt)
  return { running: readonly(running), seconds: readonly(seconds), start, stop, clear, stillRuns }
}
