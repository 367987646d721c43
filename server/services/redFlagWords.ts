import type { AlertOrigin } from '../../shared/alerts.ts'
import { redFlagRows } from '../../shared/redFlagRows.ts'
import type { QuotedFlag } from '../../shared/redFlagWords.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import type { Tx } from '../dataSource.ts'
import { selectOne, selectRows } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { raiseFlags } from './redFlags.ts'

const longestQuote = 80
const mostQuotes = 4

export interface WrittenFlags {
  childId: string
  origin: AlertOrigin
  originId: string
  found: readonly QuotedFlag[]
  writer: 'family' | 'teacher'
  /** Null when nobody signed in wrote it. */
  raisedById: string | null
  relation: ChildRelation | null
}

/**
 * Raises the signs in words of somebody’s own, quoted. A quote that stands under an open sign already, or that this answer
 * raised before, is nothing new, so that saving again brings nothing back that was acted on.
 */
export const raiseWrittenFlags = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  { found, writer, ...from }: WrittenFlags,
): Promise<void> => {
  if (found.length === 0) return
  const { childId, originId } = from
  await selectOne('SELECT id FROM children WHERE id = :childId FOR UPDATE', { childId }, tx)
  const standing = await selectRows<{ flag: string; text: string }>(
    `SELECT a.flag, a.text FROM alerts a WHERE a.childId = :childId AND a.flag IN (:flags)
       AND (a.actedAt IS NULL OR a.originId = :originId) FOR UPDATE`,
    { childId, originId, flags: found.map(({ id }) => id) },
    tx,
  )
  const flags = found.flatMap(({ id, quotes }) => {
    const told = standing.filter(({ flag }) => flag === id).map(({ text }) => text.toLowerCase())
    const fresh = quotes
      .map((quote) => `“${quote.slice(0, longestQuote)}”`)
      .filter((quote) => !told.some((text) => text.includes(quote.toLowerCase())))
      .slice(0, mostQuotes)
    return fresh.length === 0
      ? []
      : [{ ...redFlagRows[id], words: `The ${writer} wrote: ${fresh.join(', ')}.`, signs: fresh }]
  })
  await raiseFlags(tx, record, { ...from, flags, fresh: flags.map(({ id }) => id) })
}
