import type { EntityTarget, ObjectLiteral } from 'typeorm'
import type { QueryDeepPartialEntity } from 'typeorm/query-builder/QueryPartialEntity.js'
import type { Tx } from '../dataSource.ts'

interface Versioned extends ObjectLiteral {
  id: string
  version: number
}

/**
 * Changes a versioned row only if it still has the version the person saw; answers whether it did.
 * The version rises by itself. `save()` is no use here: it writes over a newer row without a word.
 */
export const updateIfCurrent = async <E extends Versioned>(
  tx: Tx,
  target: EntityTarget<E>,
  id: string,
  version: number,
  patch: QueryDeepPartialEntity<E>,
): Promise<boolean> => {
  const result = await tx
    .createQueryBuilder()
    .update(target)
    .set(patch)
    .where('id = :id AND version = :version', { id, version })
    .execute()
  return result.affected === 1
}
