import { createHash } from 'node:crypto'
import type { ChildRelation } from '../../shared/roles.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import { database, type Tx } from '../dataSource.ts'
import { unavailable } from '../errors.ts'
import { logger } from '../logger.ts'

/** What an entry says. Ids, words of our own and counts only: no names, no clinical text. */
export interface AuditFact {
  /** Noun and verb, e.g. `letter.read`. */
  action: string
  objectType?: string
  objectId?: string
  childId?: string | null
  relation?: ChildRelation | null
  result?: 'allowed' | 'denied'
  /** E.g. the ids a list showed. */
  detail?: Record<string, string | number | boolean | readonly string[] | null>
}

interface Entry {
  at: Date
  actorId: string | null
  roles: string
  relation: string | null
  action: string
  objectType: string | null
  objectId: string | null
  childId: string | null
  result: 'allowed' | 'denied'
  requestId: string
  detail: string | null
}

/** One chain for each app process; set at boot. */
let chain = 'main'

const emptyHash = Buffer.alloc(32)

const toEntry = (actor: Actor, fact: AuditFact): Entry => ({
  at: now(),
  actorId: actor.viewer?.id ?? null,
  roles: actor.viewer?.roles.join(',') ?? '',
  relation: fact.relation ?? null,
  action: fact.action,
  objectType: fact.objectType ?? null,
  objectId: fact.objectId ?? null,
  childId: fact.childId ?? null,
  result: fact.result ?? 'allowed',
  requestId: actor.requestId,
  detail: fact.detail ? JSON.stringify(fact.detail) : null,
})

/** The text whose hash links an entry to the one before it. */
export const canonicalEntry = (entry: Entry, position: number): string =>
  JSON.stringify([
    position,
    entry.at.toISOString(),
    entry.actorId,
    entry.roles,
    entry.relation,
    entry.action,
    entry.objectType,
    entry.objectId,
    entry.childId,
    entry.result,
    entry.requestId,
    entry.detail,
  ])

export const linkHash = (previous: Buffer, canonical: string): Buffer =>
  createHash('sha256').update(previous).update(canonical).digest()

/** Takes the head lock, so call it last in a transaction: everybody else's entries wait for the commit. */
const append = async (tx: Tx, entries: readonly Entry[]): Promise<void> => {
  const [head] = (await tx.query('SELECT position, hash FROM audit_heads WHERE chain = ? FOR UPDATE', [
    chain,
  ])) as {
    position: number
    hash: Buffer
  }[]
  if (!head) throw new Error('The audit chain of this process has not been opened')
  let { position, hash } = head
  const rows = entries.map((entry) => {
    position += 1
    const previousHash = hash
    hash = linkHash(previousHash, canonicalEntry(entry, position))
    return [chain, position, ...Object.values(columns(entry)), previousHash, hash]
  })
  await tx.query(
    `INSERT INTO audit_entries (chain, position, at, actorId, roles, relation, action, objectType, objectId, childId,
       result, requestId, detail, previousHash, hash) VALUES ?`,
    [rows],
  )
  await tx.query('UPDATE audit_heads SET position = ?, hash = ? WHERE chain = ?', [position, hash, chain])
}

const columns = (entry: Entry) => ({
  at: entry.at,
  actorId: entry.actorId,
  roles: entry.roles,
  relation: entry.relation,
  action: entry.action,
  objectType: entry.objectType,
  objectId: entry.objectId,
  childId: entry.childId,
  result: entry.result,
  requestId: entry.requestId,
  detail: entry.detail,
})

/** Entries of a business write, in its transaction. Called by `transact`. */
export const appendAudit = async (tx: Tx, actor: Actor, facts: readonly AuditFact[]): Promise<void> => {
  await append(
    tx,
    facts.map((fact) => toEntry(actor, fact)),
  )
  actor.audited = true
}

interface Waiting {
  entries: Entry[]
  resolve: () => void
  reject: (error: unknown) => void
}

const largestGroup = 200
let queue: Waiting[] = []
let flushing = false

const flush = async (): Promise<void> => {
  if (flushing) return
  flushing = true
  while (queue.length > 0) {
    const group = queue.slice(0, largestGroup)
    queue = queue.slice(group.length)
    try {
      await database().transaction((tx) =>
        append(
          tx,
          group.flatMap((waiting) => waiting.entries),
        ),
      )
      group.forEach((waiting) => waiting.resolve())
    } catch (error) {
      logger.error({ code: (error as { code?: string }).code }, 'audit entries could not be written')
      group.forEach((waiting) => waiting.reject(unavailable()))
    }
  }
  flushing = false
}

/**
 * Entries for reads and denials: written in groups, one head lock and one INSERT a group. Resolves when durable;
 * rejects with 503 when it cannot be, so that nothing is shown that was not recorded.
 */
export const recordAudit = (actor: Actor, ...facts: AuditFact[]): Promise<void> => {
  actor.audited = true
  return new Promise((resolve, reject) => {
    queue.push({ entries: facts.map((fact) => toEntry(actor, fact)), resolve, reject })
    void flush()
  })
}

/** The read of something of one child, as every record page records it. */
export const recordChildRead = (
  actor: Actor,
  access: ChildAccess,
  action: string,
  object: Pick<AuditFact, 'objectType' | 'objectId' | 'detail'> = {},
): Promise<void> =>
  recordAudit(actor, { action, childId: access.childId, relation: access.relation, ...object })

/**
 * Opens this process's chain. Its first entry names the heads of all chains, so that cutting the tail of one shows
 * in the others.
 */
export const openAuditChain = async (name: string): Promise<void> => {
  chain = name
  await database().transaction(async (tx) => {
    await tx.query('INSERT IGNORE INTO audit_heads (chain, position, hash) VALUES (?, 0, ?)', [
      name,
      emptyHash,
    ])
    const heads = (await tx.query('SELECT chain, position, hash FROM audit_heads ORDER BY chain')) as {
      chain: string
      position: number
      hash: Buffer
    }[]
    const anchors = heads.map((head) => `${head.chain}:${head.position}:${head.hash.toString('hex')}`)
    await append(tx, [
      toEntry(
        { viewer: null, requestId: 'start', audited: false },
        { action: 'chain.opened', detail: { heads: anchors } },
      ),
    ])
  })
}
