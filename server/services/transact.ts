import { setTimeout as pause } from 'node:timers/promises'
import type { Actor } from '../access/actor.ts'
import { database, type Tx } from '../dataSource.ts'
import { appendAudit, type AuditFact } from './audit.ts'

const retries = 3

/** Deadlock and lock wait time-out: MariaDB has rolled back, so the same work may run again. */
const isLockTrouble = (error: unknown) =>
  ['ER_LOCK_DEADLOCK', 'ER_LOCK_WAIT_TIMEOUT', 'ER_CHECKREAD'].includes(
    (error as { code?: string }).code ?? '',
  )

/**
 * Runs one act as one transaction with its audit entries. `record` collects what to write into the audit trail;
 * the entries are appended last, because they take the chain's lock. An act without an entry is a fault of ours.
 */
export const transact = async <T>(
  actor: Actor,
  work: (tx: Tx, record: (fact: AuditFact) => void) => Promise<T>,
): Promise<T> => {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await database().transaction(async (tx) => {
        const facts: AuditFact[] = []
        const result = await work(tx, (fact) => facts.push(fact))
        if (facts.length === 0) throw new Error('A write left no audit entry')
        await appendAudit(tx, actor, facts)
        return result
      })
    } catch (error) {
      if (attempt > retries || !isLockTrouble(error)) throw error
      await pause(20 * attempt + Math.random() * 40)
    }
  }
}
