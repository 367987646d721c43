import { accessActionWords, accessKindWords, childRelationLabels } from '../../shared/accessWords.ts'
import type { AccessEntry } from '../../shared/auditEntries.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { seesWhoDidWhat } from '../policies/auditEntries.ts'
import type { AccessRow } from '../queries/auditEntries.ts'

/** Entries of jobs have no person; whoever was turned away has no relation, and at the acceptance there is none yet. */
const asWhom = ({ relation, actorId, result }: AccessRow): string => {
  if (relation !== null) return childRelationLabels[relation]
  if (result === 'denied') return 'Nobody to this child'
  return actorId === null ? 'Fanflower' : 'The clinic'
}

export const presentAccessEntry = (row: AccessRow, access: ChildAccess): AccessEntry => {
  const everything = seesWhoDidWhat(access)
  const own = row.actorId === access.viewer.id
  return {
    id: String(row.id),
    at: row.at.toISOString(),
    who: everything || own ? (row.actor ?? 'Fanflower') : asWhom(row),
    relation: asWhom(row),
    action: everything ? accessActionWords(row.action) : accessKindWords(row.action),
    result: row.result,
  }
}
