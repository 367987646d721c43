import type { Day } from '../../shared/days.ts'
import type {
  DeclineReferral,
  Priority,
  ReferralConcern,
  ReferralDetails,
  ReferralSource,
  ReferralStatus,
} from '../../shared/referrals.ts'
import type { ParentalResponsibility } from '../../shared/guardians.ts'
import { isId } from '../../shared/fields.ts'
import type { Viewer } from '../access/actor.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { seesEveryReferral } from '../policies/referrals.ts'
import { selectPage, type PageOf, type PageSlice } from './pages.ts'
import { flag, fromJson, likePattern, selectOne, type Fragment, type SqlParameters } from './sql.ts'
import { staffScope } from './staffScope.ts'

const ownChild = (viewer: Viewer): Fragment => staffScope(viewer, 'r.childId', ['assignedTherapist'])

/**
 * Which referrals the viewer may know of: office and lead all but those of their own children, a therapist the
 * undecided queue and those of the children they hold.
 */
export const referralScope = (viewer: Viewer): Fragment => {
  if (seesEveryReferral(viewer)) {
    const every = staffScope(viewer, 'r.childId', ['clinicLead', 'administrator'])
    return { sql: `(r.childId IS NULL OR ${every.sql})`, parameters: every.parameters }
  }
  const own = ownChild(viewer)
  return { sql: `(r.status IN ('new', 'incomplete') OR ${own.sql})`, parameters: own.parameters }
}

export interface ReferralListRow {
  id: string
  receivedOn: Day
  source: ReferralSource
  status: ReferralStatus
  priority: Priority | null
  givenName: string
  familyName: string
  birthDate: Day
  /** Whether this viewer may see whom it is about in the list. */
  named: boolean
  schoolClassId: string | null
  schoolName: string | null
  schoolNote: string | null
  concerns: ReferralConcern[]
  responsibilities: ParentalResponsibility[]
}

type StoredListRow = Omit<ReferralListRow, 'named' | 'concerns' | 'responsibilities'> & {
  named: number
  concerns: string
  responsibilities: string | null
}

export const referralSorts = ['receivedOn', 'childName', 'status'] as const
export type ReferralSort = (typeof referralSorts)[number]

export interface ReferralListRequest extends PageSlice {
  status: ReferralStatus | null
  search: string | null
  sort: ReferralSort
  direction: 'asc' | 'desc'
}

export const listReferrals = async (
  viewer: Viewer,
  { status, search, sort, direction, ...slice }: ReferralListRequest,
): Promise<PageOf<ReferralListRow>> => {
  const scope = referralScope(viewer)
  const own = ownChild(viewer)
  const named = seesEveryReferral(viewer) ? '1 = 1' : own.sql
  const parameters: SqlParameters = { ...scope.parameters, ...own.parameters }
  const conditions = [scope.sql]
  if (status !== null) {
    conditions.push('r.status = :status')
    parameters.status = status
  }
  if (search !== null) {
    // A search on names must not betray a child in a queue that shows none.
    conditions.push(`((${named}) AND (CONCAT_WS(' ', r.givenName, r.familyName) LIKE :word
      OR JSON_VALUE(r.details, '$.referrerName') LIKE :word))`)
    parameters.word = likePattern(search)
  }
  const orders: Record<ReferralSort, string> = {
    receivedOn: `r.receivedOn ${direction}`,
    childName: `IF(${named}, CONCAT_WS(' ', r.familyName, r.givenName), '') ${direction}`,
    status: `FIELD(r.status, 'incomplete', 'new', 'accepted', 'merged', 'declined') ${direction}`,
  }
  const found = await selectPage<StoredListRow>(
    {
      select: `r.id, r.receivedOn, JSON_VALUE(r.details, '$.source') AS source, r.status, r.priority, r.givenName,
        r.familyName, r.birthDate, (${named}) AS named, r.schoolClassId, s.name AS schoolName,
        JSON_VALUE(r.details, '$.schoolNote') AS schoolNote, JSON_QUERY(r.details, '$.concerns') AS concerns,
        JSON_EXTRACT(r.details, '$.carers[*].parentalResponsibility') AS responsibilities`,
      from: `FROM referrals r LEFT JOIN school_classes k ON k.id = r.schoolClassId
        LEFT JOIN schools s ON s.id = k.schoolId WHERE ${conditions.join(' AND ')}`,
      orderBy: `${orders[sort]}, r.receivedOn DESC, r.id`,
      parameters,
    },
    slice,
  )
  return {
    total: found.total,
    rows: found.rows.map((row) => ({
      ...row,
      named: flag(row.named),
      concerns: fromJson<ReferralConcern[]>(row.concerns),
      responsibilities:
        row.responsibilities === null ? [] : fromJson<ParentalResponsibility[]>(row.responsibilities),
    })),
  }
}

export interface ReferralRecord {
  id: string
  status: ReferralStatus
  details: ReferralDetails
  schoolName: string | null
  className: string | null
  childId: string | null
  recordNumber: string | null
  decidedBy: string | null
  decidedAt: Date | null
  decisionReason: string | null
  outcome: DeclineReferral['outcome'] | null
  version: number
}

/** One referral whole, under the viewer's scope; otherwise 404. */
export const findReferral = async (viewer: Viewer, id: string, tx?: Tx): Promise<ReferralRecord> => {
  if (!isId(id)) throw notFound()
  const scope = referralScope(viewer)
  const row = await selectOne<Omit<ReferralRecord, 'details'> & { details: string }>(
    `SELECT r.id, r.status, r.details, s.name AS schoolName, k.name AS className, r.childId, c.recordNumber,
       u.displayName AS decidedBy, r.decidedAt, r.decisionReason, r.outcome, r.version
     FROM referrals r LEFT JOIN school_classes k ON k.id = r.schoolClassId LEFT JOIN schools s ON s.id = k.schoolId
       LEFT JOIN children c ON c.id = r.childId LEFT JOIN users u ON u.id = r.decidedById
     WHERE r.id = :id AND ${scope.sql}`,
    { id, ...scope.parameters },
    tx,
  )
  if (!row) throw notFound()
  return { ...row, details: fromJson<ReferralDetails>(row.details) }
}
