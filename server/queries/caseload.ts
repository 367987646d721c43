import type { CaseloadFilter, CaseloadNeedKind, CaseloadSort } from '../../shared/caseload.ts'
import type { WritingHand } from '../../shared/children.ts'
import type { Day } from '../../shared/days.ts'
import { episodeStates, type EpisodeState } from '../../shared/episodes.ts'
import type { Viewer } from '../access/actor.ts'
import { matchesWords } from './children/lists.ts'
import { needColumns, needConditions, needParameters, type NeedMoment } from './caseloadNeeds.ts'
import { therapistName } from './currentTherapist.ts'
import { latestEpisode } from './episodes.ts'
import { runsAt } from './inForce.ts'
import type { PageOf, PageSlice } from './pages.ts'
import { count, flag, fromJson, selectOne, selectRows, type SqlParameters } from './sql.ts'
import { staffScope } from './staffScope.ts'

export interface CaseloadRecord {
  id: string
  recordNumber: string
  givenName: string
  familyName: string
  birthDate: Day
  schoolName: string | null
  className: string | null
  state: EpisodeState
  receivedOn: Day
  writingHand: WritingHand | null
  therapist: string | null
  nextReviewOn: Day | null
  lastSeenOn: Day | null
  unsignedNotes: number
  unsignedSince: Date | null
  countersignSince: Date | null
  draftSince: Date | null
  approvalSince: Date | null
  lettersFailed: number
  consented: boolean
  consentEndsAt: Date | null
  task: { text: string; dueOn: Day | null } | null
  tasks: number
}

type Counted = 'unsignedNotes' | 'lettersFailed' | 'tasks'
type StoredRecord = Omit<CaseloadRecord, Counted | 'consented' | 'task'> &
  Record<Counted, string> & { consented: number; task: string | null; total: string }

export interface CaseloadRequest extends PageSlice {
  sort: CaseloadSort
  direction: 'asc' | 'desc'
  search: string | null
  state: EpisodeState | null
  show: CaseloadFilter
  need: CaseloadNeedKind | null
  /** A therapist's id, or 'none' for children nobody holds. */
  therapistId: string | null
}

const lastSeen = `(SELECT MAX(ln.heldOn) FROM session_notes ln WHERE ln.childId = c.id AND ln.discardedAt IS NULL
  AND ln.state <> 'draft')`

const heldBy = (condition: string) => `EXISTS (SELECT 1 FROM assignments ha WHERE ha.childId = c.id
  AND ${runsAt('ha')}${condition})`

const nullsLast = (column: string, direction: string) => `${column} IS NULL, ${column} ${direction}`

const orders = (therapist: string): Record<CaseloadSort, (direction: 'asc' | 'desc') => string> => ({
  name: (direction) => `c.familyName ${direction}, c.givenName ${direction}`,
  // The youngest were born last.
  age: (direction) => `c.birthDate ${direction === 'asc' ? 'desc' : 'asc'}`,
  state: (direction) =>
    `FIELD(e.state, ${episodeStates.map((state) => `'${state}'`).join(', ')}) ${direction}`,
  school: (direction) => `${nullsLast('s.name', direction)}, k.name ${direction}`,
  nextReviewOn: (direction) => nullsLast('c.nextReviewOn', direction),
  lastSeenOn: (direction) => nullsLast(lastSeen, direction),
  therapist: (direction) => nullsLast(therapist, direction),
})

const tables = `FROM children c JOIN episodes e ON e.id = ${latestEpisode('c.id')}
  LEFT JOIN school_classes k ON k.id = c.schoolClassId LEFT JOIN schools s ON s.id = k.schoolId`

/**
 * One page of the caseload with what waits for the viewer, in one query: the page is cut first, so that only its
 * children are looked at closely.
 */
export const listCaseload = async (
  viewer: Viewer,
  request: CaseloadRequest,
  moment: NeedMoment,
): Promise<PageOf<CaseloadRecord>> => {
  const scope = staffScope(viewer, 'c.id', ['assignedTherapist', 'clinicLead'])
  const therapist = therapistName('c.id')
  const conditions = [scope.sql]
  const parameters: SqlParameters = {
    ...scope.parameters,
    ...therapist.parameters,
    ...needParameters(viewer, moment),
    pageSize: request.size,
    pageOffset: request.offset,
  }
  if (request.show === 'open') conditions.push('e.state NOT IN (:closed)')
  if (request.show === 'closed') conditions.push('e.state IN (:closed)')
  if (request.state !== null) {
    conditions.push('e.state = :state')
    parameters.state = request.state
  }
  if (request.search !== null) {
    const words = matchesWords(request.search)
    conditions.push(words.sql)
    Object.assign(parameters, words.parameters)
  }
  if (request.need !== null) conditions.push(needConditions[request.need])
  if (request.therapistId === 'none') conditions.push(`NOT ${heldBy('')}`)
  else if (request.therapistId !== null) {
    conditions.push(heldBy(' AND ha.therapistId = :therapistId'))
    parameters.therapistId = request.therapistId
  }
  const where = `WHERE ${conditions.join(' AND ')}`
  const order = `${orders(therapist.sql)[request.sort](request.direction)}, c.familyName, c.givenName, c.id`
  const rows = await selectRows<StoredRecord>(
    `WITH page AS (SELECT c.id, ROW_NUMBER() OVER (ORDER BY ${order}) AS place, COUNT(*) OVER () AS total
       ${tables} ${where} ORDER BY place LIMIT :pageSize OFFSET :pageOffset)
     SELECT c.id, c.recordNumber, c.givenName, c.familyName, c.birthDate, s.name AS schoolName, k.name AS className,
       e.state, e.receivedOn, c.writingHand, ${therapist.sql} AS therapist, c.nextReviewOn, ${lastSeen} AS lastSeenOn,
       ${needColumns}, p.total
     FROM page p JOIN children c ON c.id = p.id JOIN episodes e ON e.id = ${latestEpisode('c.id')}
       LEFT JOIN school_classes k ON k.id = c.schoolClassId LEFT JOIN schools s ON s.id = k.schoolId
     WHERE ${scope.sql} ORDER BY p.place`,
    parameters,
  )
  return { rows: rows.map(toRecord), total: await totalOf(rows, request, where, parameters) }
}

/** A page past the end has no row to carry the count, so only then the list is counted again. */
const totalOf = async (
  [first]: readonly StoredRecord[],
  { offset }: PageSlice,
  where: string,
  parameters: SqlParameters,
): Promise<number> => {
  if (first) return count(first.total)
  if (offset === 0) return 0
  const counted = await selectOne<{ total: string }>(
    `SELECT COUNT(*) AS total ${tables} ${where}`,
    parameters,
  )
  return count(counted?.total ?? '0')
}

const toRecord = ({ total: _total, ...row }: StoredRecord): CaseloadRecord => ({
  ...row,
  unsignedNotes: count(row.unsignedNotes),
  lettersFailed: count(row.lettersFailed),
  tasks: count(row.tasks),
  consented: flag(row.consented),
  task: row.task === null ? null : fromJson<{ text: string; dueOn: Day | null }>(row.task),
})
