import { slowDown } from '../errors.ts'

const largestQueue = 8

let last: Promise<unknown> = Promise.resolve()
let waiting = 0

/**
 * Opening a picture takes memory and a processor for a moment, so uploads are opened one at a time for the whole
 * process. Eight may wait; the next is asked to come back (429).
 */
export const oneAtATime = async <T>(work: () => Promise<T>): Promise<T> => {
  if (waiting >= largestQueue) throw slowDown(5)
  waiting += 1
  const mine = last.then(work).finally(() => (waiting -= 1))
  last = mine.catch(() => undefined)
  return mine
}
