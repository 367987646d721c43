import { stale } from '../errors.ts'

/** Thrown inside a transaction when the row has a newer version than the one the change was made from. */
export class StaleWrite extends Error {}

/**
 * Waits for a change and answers a stale one with what is stored now. `current` runs after the transaction has ended:
 * inside it, the snapshot may be older than the version that won.
 */
export const answerStale = async <T>(change: Promise<T>, current: () => Promise<unknown>): Promise<T> => {
  try {
    return await change
  } catch (error) {
    if (!(error instanceof StaleWrite)) throw error
    throw stale(await current())
  }
}
