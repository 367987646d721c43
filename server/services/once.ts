import { createHash, randomUUID } from 'node:crypto'
import type { Actor } from '../access/actor.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { IdempotencyKey } from '../entities/IdempotencyKey.ts'
import { invalid } from '../errors.ts'

export interface OnceKey {
  /** The Idempotency-Key header; null when the client sent none. */
  key: string | null
  /** What was asked for; the same key with another request is refused. */
  request: unknown
}

/**
 * Makes a create idempotent: the same key again answers the row made the first time. Call it first in the
 * transaction: the unique key makes a parallel twin wait for this one and then find its row.
 */
export const once = async (
  tx: Tx,
  actor: Actor,
  { key, request }: OnceKey,
  create: (id: string) => Promise<void>,
): Promise<string> => {
  const id = randomUUID()
  if (key === null || actor.viewer === null) {
    await create(id)
    return id
  }
  const digest = createHash('sha256').update(JSON.stringify(request)).digest()
  await tx.query(
    `INSERT IGNORE INTO idempotency_keys (id, userId, keyValue, digest, resultId, createdAt) VALUES (?, ?, ?, ?, ?, ?)`,
    [randomUUID(), actor.viewer.id, key, digest, id, now()],
  )
  const kept = await tx.findOneByOrFail(IdempotencyKey, { userId: actor.viewer.id, keyValue: key })
  if (!kept.digest.equals(digest))
    throw invalid({ form: 'This form was sent before with other content. Reload the page.' })
  if (kept.resultId === id) await create(id)
  return kept.resultId
}
