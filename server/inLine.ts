import { busy } from './errors.ts'

export interface LineRules {
  /** Pieces of work that run at one time. */
  atOnce: number
  /** How many may wait behind them; the next is refused. */
  mostWaiting: number
  /** Seconds after which somebody refused may come back. */
  retryAfterSeconds: number
}

/**
 * A line for work that takes memory or a processor for a moment, one line for the whole process: so many run at once
 * and the rest wait in the order they came. Throws 503 with a time to come back when the line is full.
 */
export const createLine = ({ atOnce, mostWaiting, retryAfterSeconds }: LineRules) => {
  let running = 0
  const waiting: (() => void)[] = []
  return async <T>(work: () => Promise<T>): Promise<T> => {
    if (running < atOnce) running += 1
    else {
      if (waiting.length >= mostWaiting) throw busy(retryAfterSeconds)
      // The place of the one that ends is handed on, so that nobody slips in between.
      await new Promise<void>((resolve) => waiting.push(resolve))
    }
    try {
      return await work()
    } finally {
      const next = waiting.shift()
      if (next) next()
      else running -= 1
    }
  }
}
