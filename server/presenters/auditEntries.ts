import {
  accessActionWords,
  accessKindWords,
  carerByLinkWords,
  childRelationLabels,
} from '../../shared/accessWords.ts'
import type { AccessEntry } from '../../shared/auditEntries.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { seesWhoDidWhat } from '../policies/auditEntries.ts'
import type { AccessRow } from '../queries/auditEntries.ts'

/** Entries of jobs have no person; whoever was turned away has no relation, and at the acceptance there is none yet. */
const asWhom = ({ relation, actorId, result }: AccessRow): string => {
  if (relation === 'guardian' && actorId === null) return carerByLinkWords
  if (relation !== null) return childRelationLabels[relation]
  if (result === 'denied') return 'Nobody to this child'
  return actorId === null ? 'Fanflower' : 'The clinic'
}

/** Without a sign-in a carer answers by link; whatever else has no person was done by a job. */
const nobodysName = ({ relation }: AccessRow): string =>
  relation === 'guardian' ? carerByLinkWords : 'Fanflower'

export const presentAccessEntry = (row: AccessRow, access: ChildAccess): AccessEntry => {
  const everything = seesWhoDidWhat(access)
  const own = row.actorId === access.viewer.id
  return {
    id: String(row.id),
    at: row.at.toISOString(),
    who: everything || own ? (row.actor ?? nobodysName(row)) : asWhom(row),
    relation: asWhom(row),
    action: everything ? accessActionWords(row.action) : accessKindWords(row.action),
    result: row.result,
  }
}
