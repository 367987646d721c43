import { createHash, randomUUID } from 'node:crypto'
import type { Actor } from '../access/actor.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { IdempotencyKey } from '../entities/IdempotencyKey.ts'
import { invalid } from '../errors.ts'
import type { AuditFact } from './audit.ts'

export interface OnceKey {
  /** The Idempotency-Key header; null when the client sent none. */
  key: string | null
  /** What was asked for, its noun first; the same key with another request is refused. */
  request: readonly unknown[]
}

/**
 * Makes a create idempotent: the same key again answers the id made the first time, and `again`. Call it first in the
 * transaction: the unique key makes a parallel twin wait for this one and then find its row.
 */
export const once = async (
  tx: Tx,
  actor: Actor,
  { key, request }: OnceKey,
  create: (id: string) => Promise<void>,
): Promise<{ id: string; again: boolean }> => {
  const id = randomUUID()
  if (key === null || actor.viewer === null) {
    await create(id)
    return { id, again: false }
  }
  const digest = createHash('sha256').update(JSON.stringify(request)).digest()
  await tx.query(
    `INSERT IGNORE INTO idempotency_keys (id, userId, keyValue, digest, resultId, createdAt) VALUES (?, ?, ?, ?, ?, ?)`,
    [randomUUID(), actor.viewer.id, key, digest, id, now()],
  )
  const kept = await tx.findOneByOrFail(IdempotencyKey, { userId: actor.viewer.id, keyValue: key })
  if (!kept.digest.equals(digest))
    throw invalid({ form: 'This form was sent before with other content. Reload the page.' })
  const again = kept.resultId !== id
  if (!again) await create(id)
  return { id: kept.resultId, again }
}

const askedAgain = (fact: AuditFact): AuditFact => ({
  ...fact,
  action: `${fact.action.split('.')[0]}.asked_again`,
})

/** `once` for one row with its audit entry; a repeat is recorded as asked for again, not as done. Answers the row's id. */
export const createOnce = async (
  tx: Tx,
  actor: Actor,
  record: (fact: AuditFact) => void,
  key: OnceKey,
  factOf: (id: string) => AuditFact,
  create: (id: string) => Promise<void>,
): Promise<string> => {
  const { id, again } = await once(tx, actor, key, create)
  record(again ? askedAgain(factOf(id)) : factOf(id))
  return id
}
