import type { EntityTarget, ObjectLiteral } from 'typeorm'
import type { QueryDeepPartialEntity } from 'typeorm/query-builder/QueryPartialEntity.js'
import type { Tx } from '../dataSource.ts'
import { stale } from '../errors.ts'

interface Versioned extends ObjectLiteral {
  id: string
  version: number
}

/** Thrown inside a transaction when the row has a newer version than the one the change was made from. */
export class StaleWrite extends Error {}

/**
 * Changes a versioned row only if it still has the version the person saw; throws StaleWrite otherwise.
 * The version rises by itself. `save()` is no use here: it writes over a newer row without a word.
 */
export const updateIfCurrent = async <E extends Versioned>(
  tx: Tx,
  target: EntityTarget<E>,
  id: string,
  version: number,
  patch: QueryDeepPartialEntity<E>,
): Promise<void> => {
  const result = await tx
    .createQueryBuilder()
    .update(target)
    .set(patch)
    .where('id = :id AND version = :version', { id, version })
    .execute()
  if (result.affected !== 1) throw new StaleWrite()
}

/**
 * Waits for a change and answers a stale one (409) with what is stored now, as the caller's page shows it. `current`
 * runs after the transaction has ended: inside it, the snapshot may be older than the version that won. It shows a
 * record, so it leaves the entry of a read.
 */
export const answerStale = async <T>(change: Promise<T>, current: () => Promise<unknown>): Promise<T> => {
  try {
    return await change
  } catch (error) {
    if (!(error instanceof StaleWrite)) throw error
    throw stale(await current())
  }
}
