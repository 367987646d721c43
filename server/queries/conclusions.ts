import type { ConclusionContent, ConclusionState, SignedEvidence } from '../../shared/conclusions.ts'
import { isId } from '../../shared/fields.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { within } from './scope.ts'
import { flag, fromJson, selectOne, selectRows } from './sql.ts'

interface StoredConclusion {
  id: string
  childId: string
  authorId: string
  author: string
  state: ConclusionState
  content: string
  evidence: string | null
  signedAt: Date | null
  countersignedAt: Date | null
  countersignedBy: string | null
  replacesId: string | null
  replacedById: string | null
  draftOpen: number
  version: number
}

export interface ConclusionRecord extends Omit<StoredConclusion, 'content' | 'evidence' | 'draftOpen'> {
  content: ConclusionContent
  evidence: SignedEvidence | null
  /** A conclusion of this child, this one or another, is being written. */
  draftOpen: boolean
}

const toRecord = ({ content, evidence, draftOpen, ...rest }: StoredConclusion): ConclusionRecord => ({
  ...rest,
  content: fromJson<ConclusionContent>(content),
  evidence: evidence === null ? null : fromJson<SignedEvidence>(evidence),
  draftOpen: flag(draftOpen),
})

const selectConclusions = async (
  access: ChildAccess,
  condition: string,
  parameters: Record<string, string> = {},
  tx?: Tx,
): Promise<ConclusionRecord[]> => {
  const scope = within(access, 'k.childId')
  const rows = await selectRows<StoredConclusion>(
    `SELECT k.id, k.childId, k.authorId, a.displayName AS author, k.state, k.content, k.evidence, k.signedAt,
       k.countersignedAt, cu.displayName AS countersignedBy, k.replacesId, n.id AS replacedById,
       EXISTS (SELECT 1 FROM conclusions d WHERE d.childId = k.childId AND d.state = 'draft') AS draftOpen, k.version
     FROM conclusions k
     JOIN users a ON a.id = k.authorId
     LEFT JOIN users cu ON cu.id = k.countersignedById
     LEFT JOIN conclusions n ON n.replacesId = k.id
     WHERE ${scope.sql} AND ${condition} ORDER BY k.createdAt DESC, k.id`,
    { ...scope.parameters, ...parameters },
    tx,
  )
  return rows.map(toRecord)
}

/** Every conclusion of a child, the newest first. */
export const listConclusions = (access: ChildAccess): Promise<ConclusionRecord[]> =>
  selectConclusions(access, '1 = 1')

export const findConclusion = async (access: ChildAccess, id: string, tx?: Tx): Promise<ConclusionRecord> => {
  if (!isId(id)) throw notFound()
  const [found] = await selectConclusions(access, 'k.id = :conclusionId', { conclusionId: id }, tx)
  if (!found) throw notFound()
  return found
}

export interface ReportChild {
  givenName: string
  preferredName: string | null
  familyName: string
  recordNumber: string
  birthDate: string
}

/** How the child is called on the record now. */
export const findReportChild = async (access: ChildAccess, tx: Tx): Promise<ReportChild> => {
  const scope = within(access, 'c.id')
  const child = await selectOne<ReportChild>(
    `SELECT c.givenName, c.preferredName, c.familyName, c.recordNumber, c.birthDate FROM children c WHERE ${scope.sql}`,
    scope.parameters,
    tx,
  )
  if (!child) throw notFound()
  return child
}
