import type { Actor } from '../access/actor.ts'
import type { Tx } from '../dataSource.ts'
import type { AuditFact } from './audit.ts'
import { once, type OnceKey } from './once.ts'

/** `once` with its audit entry: the first call records `<noun>.created`, a repeat that it was asked for again. */
export const createOnce = async (
  tx: Tx,
  actor: Actor,
  record: (fact: AuditFact) => void,
  key: OnceKey,
  fact: { objectType: string } & Pick<AuditFact, 'childId' | 'relation'>,
  create: (id: string) => Promise<void>,
): Promise<string> => {
  let created = false
  const id = await once(tx, actor, key, async (fresh) => {
    created = true
    await create(fresh)
  })
  record({ ...fact, action: `${fact.objectType}.${created ? 'created' : 'asked_again'}`, objectId: id })
  return id
}
