import { closedStates } from '../../shared/episodes.ts'
import { addDays, addWorkingDays, type Day } from '../../shared/days.ts'
import type { Attention } from '../../shared/attention.ts'
import type { ReviewFigureId } from '../../shared/review.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import { reviewEscalationDays, reviewNoticeDays } from '../../shared/tasks.ts'
import { waitingStates } from '../../shared/waits.ts'
import type { Viewer } from '../access/actor.ts'
import { now } from '../clock.ts'
import { seesEveryReferral } from '../policies/referrals.ts'
import { therapistName } from './currentTherapist.ts'
import { latestEpisode } from './episodes.ts'
import { consentHolds } from './inForce.ts'
import { recordName } from './names.ts'
import { selectPage, type PageOf, type PageSlice } from './pages.ts'
import { referralScope } from './referrals.ts'
import { count, selectOne, type Fragment, type SqlParameters } from './sql.ts'
import { staffScope, type StaffRelation } from './staffScope.ts'
import { taskScope } from './tasks.ts'

/** The lists behind the lead's figures, and those that only one person's day shows. */
export type WorkListId =
  | ReviewFigureId
  | 'reviews_due'
  | 'reviews_escalated'
  | 'notes_own'
  | 'letters_own'
  | 'referrals_undecided'
  | 'tasks'

export interface WorkRow {
  id: string
  childId: string | null
  /** Null where the viewer may not learn whom it is about. */
  name: string | null
  recordNumber: string | null
  /** Of a referral, for its age band; null for everything else. */
  birthDate: Day | null
  person: string | null
  /** One of the two says since when. */
  sinceDay: Day | null
  sinceAt: Date | null
  /** Words of the record itself, or a state. */
  words: string | null
  level: Attention | null
  /** Of a task; null for everything else. */
  kind: string | null
}

interface WorkSql {
  id: string
  childId: string
  name: string
  recordNumber: string
  birthDate: string
  person: string
  sinceDay: string
  sinceAt: string
  words: string
  level: string
  kind: string
  from: string
  orderBy: string
}

const ofChild = {
  childId: 'c.id',
  name: recordName('c'),
  recordNumber: 'c.recordNumber',
  birthDate: 'NULL',
  sinceDay: 'NULL',
  sinceAt: 'NULL',
  words: 'NULL',
  level: 'NULL',
  kind: 'NULL',
}

/** Whose children, and what `{scope}` stands for, is filled in below; every list keeps to it. */
const episodes = (condition: string) =>
  `FROM children c JOIN episodes e ON e.id = ${latestEpisode('c.id')} WHERE {scope} AND ${condition}`
const open = 'e.state NOT IN (:closed)'
const therapist = therapistName('c.id').sql

const byEpisode = (condition: string, since: string): WorkSql => ({
  ...ofChild,
  id: 'c.id',
  person: therapist,
  sinceDay: since,
  words: 'e.state',
  from: episodes(condition),
  orderBy: `${since}, c.id`,
})

const byNote = (condition: string): WorkSql => ({
  ...ofChild,
  id: 'n.id',
  person: 'u.displayName',
  sinceAt:
    "COALESCE((SELECT q.signedAt FROM note_signatures q WHERE q.noteId = n.id AND q.kind = 'author'), n.endedAt)",
  from: `FROM session_notes n JOIN children c ON c.id = n.childId JOIN users u ON u.id = n.authorId
    WHERE {scope} AND n.discardedAt IS NULL AND ${condition}`,
  orderBy: 'n.endedAt, n.id',
})

const byLetter = (condition: string): WorkSql => ({
  ...ofChild,
  id: 'l.id',
  person: 'u.displayName',
  sinceAt: 'l.changedAt',
  words: 'l.state',
  from: `FROM letters l JOIN children c ON c.id = l.childId JOIN users u ON u.id = l.authorId
    WHERE {scope} AND l.discardedAt IS NULL AND ${condition}`,
  orderBy: 'l.changedAt, l.id',
})

const byReferral = (condition: string): WorkSql => ({
  id: 'r.id',
  childId: 'NULL',
  name: `IF(:namesReferrals, ${recordName('r')}, NULL)`,
  recordNumber: 'NULL',
  birthDate: 'r.birthDate',
  person: 'NULL',
  sinceDay: 'r.receivedOn',
  sinceAt: 'NULL',
  words: 'r.status',
  level: 'NULL',
  kind: 'NULL',
  from: `FROM referrals r WHERE {referrals} AND r.status IN ('new', 'incomplete') AND ${condition}`,
  orderBy: 'r.receivedOn, r.id',
})

const noConsent = `NOT EXISTS (SELECT 1 FROM consents f WHERE f.childId = c.id AND f.purpose = 'assessment_treatment'
  AND ${consentHolds('f')})`

const lists: Record<WorkListId, WorkSql> = {
  waiting: byEpisode('e.state IN (:waiting)', 'e.receivedOn'),
  waiting_over_target: byEpisode('e.state IN (:waiting) AND e.receivedOn < :targetDay', 'e.receivedOn'),
  reviews_overdue: byEpisode(`${open} AND c.nextReviewOn < :today`, 'c.nextReviewOn'),
  reviews_due: byEpisode(`${open} AND c.nextReviewOn <= :reviewNotice`, 'c.nextReviewOn'),
  reviews_escalated: byEpisode(`${open} AND c.nextReviewOn < :escalationDay`, 'c.nextReviewOn'),
  consent_missing: byEpisode(`${open} AND ${noConsent}`, 'e.receivedOn'),
  notes_unsigned_24: byNote("n.state = 'draft' AND n.endedAt < :unsignedSoon"),
  notes_unsigned_48: byNote("n.state = 'draft' AND n.endedAt < :unsignedOverdue"),
  notes_own: byNote("n.state = 'draft' AND n.authorId = :viewer"),
  notes_to_countersign: byNote(
    "n.state = 'awaiting_countersignature' AND n.authorId <> :viewer AND NOT :newlyQualified",
  ),
  letters_to_approve: byLetter("l.state = 'awaiting_approval'"),
  letters_own: byLetter("l.state IN ('draft', 'approved') AND l.authorId = :viewer"),
  letters_failed: {
    ...byLetter("l.state <> 'recalled' AND d.state = 'failed'"),
    sinceAt: 'COALESCE(m.lastTriedAt, d.createdAt)',
    words: 'm.problem',
    from: `FROM letter_deliveries d JOIN letters l ON l.id = d.letterId JOIN outbox_messages m ON m.id = d.outboxMessageId
      JOIN children c ON c.id = l.childId JOIN users u ON u.id = l.authorId
      WHERE {scope} AND l.discardedAt IS NULL AND l.state <> 'recalled' AND d.state = 'failed'`,
    orderBy: 'm.lastTriedAt, d.id',
  },
  referrals_untriaged: byReferral('r.receivedOn < :untriagedDay'),
  referrals_undecided: byReferral('1 = 1'),
  alerts_open: {
    ...ofChild,
    id: 'a.id',
    person: therapist,
    sinceAt: 'a.raisedAt',
    words: 'a.text',
    level: 'a.level',
    from: 'FROM alerts a JOIN children c ON c.id = a.childId WHERE {scope} AND a.actedAt IS NULL',
    orderBy: "FIELD(a.level, 'overdue', 'due', 'soon'), a.raisedAt, a.id",
  },
  tasks: {
    id: 't.id',
    childId: 't.childId',
    name: recordName('c'),
    recordNumber: 'c.recordNumber',
    birthDate: 'NULL',
    person: 'NULL',
    sinceDay: 't.dueOn',
    sinceAt: 't.createdAt',
    words: 't.text',
    level: 'NULL',
    kind: 't.kind',
    from: `FROM tasks t LEFT JOIN children c ON c.id = t.childId
      WHERE {tasks} AND t.doneAt IS NULL AND (t.assigneeId = :viewer OR t.forRole IN (:viewerRoles))`,
    orderBy: 't.dueOn IS NULL, t.dueOn, t.createdAt, t.id',
  },
}

/** Today and the clinic's thresholds, as far as lists depend on them. */
export interface WorkMoment {
  today: Day
  settings: Pick<
    ClinicSettings,
    'waitTargetWeeks' | 'unsignedSoonHours' | 'unsignedOverdueHours' | 'untriagedWorkingDays'
  >
}

const hoursAgo = (hours: number) => new Date(now().getTime() - hours * 3_600_000)

interface Reach {
  viewer: Viewer
  /** As whom the viewer looks: a lead at the clinic, a therapist at the children they hold. */
  relation: StaffRelation
}

const filled = ({ viewer, relation }: Reach, sql: string): Fragment => {
  const child = staffScope(viewer, 'c.id', [relation])
  const referrals = referralScope(viewer)
  const tasks = taskScope(viewer)
  return {
    sql: sql
      .replaceAll('{scope}', child.sql)
      .replaceAll('{referrals}', referrals.sql)
      .replaceAll('{tasks}', tasks.sql),
    parameters: { ...child.parameters, ...referrals.parameters, ...tasks.parameters },
  }
}

const parametersOf = ({ viewer }: Reach, { today, settings }: WorkMoment): SqlParameters => ({
  ...therapistName('c.id').parameters,
  now: now(),
  today,
  viewer: viewer.id,
  viewerRoles: [...viewer.roles],
  newlyQualified: viewer.newlyQualified,
  namesReferrals: seesEveryReferral(viewer),
  closed: closedStates,
  waiting: waitingStates,
  targetDay: addDays(today, -settings.waitTargetWeeks * 7),
  reviewNotice: addDays(today, reviewNoticeDays),
  escalationDay: addDays(today, -reviewEscalationDays),
  unsignedSoon: hoursAgo(settings.unsignedSoonHours),
  unsignedOverdue: hoursAgo(settings.unsignedOverdueHours),
  untriagedDay: addWorkingDays(today, -settings.untriagedWorkingDays),
})

/** One page of a list, the longest waiting first. */
export const listWork = (
  list: WorkListId,
  reach: Reach,
  moment: WorkMoment,
  slice: PageSlice,
): Promise<PageOf<WorkRow>> => {
  const { from, orderBy, ...columns } = lists[list]
  const scoped = filled(reach, from)
  return selectPage<WorkRow>(
    {
      select: Object.entries(columns)
        .map(([name, column]) => `${column} AS ${name}`)
        .join(', '),
      from: scoped.sql,
      orderBy,
      parameters: { ...parametersOf(reach, moment), ...scoped.parameters },
    },
    slice,
  )
}

/** How long each of these lists is, in one query. */
export const countWork = async <Id extends WorkListId>(
  ids: readonly Id[],
  reach: Reach,
  moment: WorkMoment,
): Promise<Record<Id, number>> => {
  const scoped = filled(reach, ids.map((id) => `(SELECT COUNT(*) ${lists[id].from}) AS \`${id}\``).join(', '))
  const row = await selectOne<Record<Id, string>>(`SELECT ${scoped.sql}`, {
    ...parametersOf(reach, moment),
    ...scoped.parameters,
  })
  return Object.fromEntries(ids.map((id) => [id, count(row?.[id] ?? '0')])) as Record<Id, number>
}
