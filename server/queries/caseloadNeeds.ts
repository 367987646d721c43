import type { CaseloadNeedKind } from '../../shared/caseload.ts'
import { consentNoticeDays } from '../../shared/caseloadNeeds.ts'
import { addDays, type Day } from '../../shared/days.ts'
import { closedStates } from '../../shared/episodes.ts'
import { reviewNoticeDays } from '../../shared/tasks.ts'
import { waitingStates, waitNoticeDays } from '../../shared/waits.ts'
import type { Viewer } from '../access/actor.ts'
import { now } from '../clock.ts'
import { seesWholeClinic } from '../policies/caseload.ts'
import { consentHolds } from './inForce.ts'
import type { SqlParameters } from './sql.ts'

const openNotes = (state: string) =>
  `FROM session_notes n WHERE n.childId = c.id AND n.discardedAt IS NULL AND n.state = '${state}'`
// A newly qualified person and the author sign no second time (policies/sessionNotes.ts).
const toCountersign = `${openNotes('awaiting_countersignature')} AND n.authorId <> :viewer AND NOT :newlyQualified`
const letters = (state: string) =>
  `FROM letters l WHERE l.childId = c.id AND l.discardedAt IS NULL AND l.state = '${state}'`
const ownDrafts = `${letters('draft')} AND l.authorId = :viewer`
const toApprove = `${letters('awaiting_approval')} AND :isLead`
const failed = `FROM letter_deliveries d JOIN letters l ON l.id = d.letterId
  WHERE l.childId = c.id AND l.state <> 'recalled' AND d.state = 'failed'`
const consent = `FROM consents f WHERE f.childId = c.id AND f.purpose = 'assessment_treatment'
  AND ${consentHolds('f')}`
const ownTasks = `FROM tasks t WHERE t.childId = c.id AND t.doneAt IS NULL
  AND (t.assigneeId = :viewer OR t.forRole IN (:viewerRoles))`

/** Columns of `NeedFacts` for the child in `c`; everything is what this viewer has to do. */
export const needColumns = `
  (SELECT COUNT(*) ${openNotes('draft')}) AS unsignedNotes,
  (SELECT MIN(n.endedAt) ${openNotes('draft')}) AS unsignedSince,
  (SELECT MIN(q.signedAt) FROM note_signatures q WHERE q.kind = 'author'
    AND q.noteId IN (SELECT n.id ${toCountersign})) AS countersignSince,
  (SELECT MIN(l.changedAt) ${ownDrafts}) AS draftSince,
  (SELECT MIN(l.changedAt) ${toApprove}) AS approvalSince,
  (SELECT COUNT(*) ${failed}) AS lettersFailed,
  EXISTS (SELECT 1 ${consent}) AS consented,
  (SELECT IF(SUM(f.expiresAt IS NULL) > 0, NULL, MAX(f.expiresAt)) ${consent}) AS consentEndsAt,
  (SELECT JSON_OBJECT('text', t.text, 'dueOn', t.dueOn) ${ownTasks}
    ORDER BY t.dueOn IS NULL, t.dueOn, t.createdAt, t.id LIMIT 1) AS task,
  (SELECT COUNT(*) ${ownTasks}) AS tasks`

const open = 'e.state NOT IN (:closed)'

/** For each kind of need the children who have it; says the same as `needsOf` does of one child. */
export const needConditions: Record<CaseloadNeedKind, string> = {
  review: `(${open} AND c.nextReviewOn <= :reviewNotice)`,
  unsigned_note: `EXISTS (SELECT 1 ${openNotes('draft')})`,
  countersign: `EXISTS (SELECT 1 ${toCountersign})`,
  letter_draft: `EXISTS (SELECT 1 ${ownDrafts})`,
  letter_approval: `EXISTS (SELECT 1 ${toApprove})`,
  letter_failed: `EXISTS (SELECT 1 ${failed})`,
  consent: `(${open} AND NOT EXISTS (SELECT 1 ${consent} AND (f.expiresAt IS NULL OR f.expiresAt > :consentNotice)))`,
  task: `EXISTS (SELECT 1 ${ownTasks})`,
  wait: '(e.state IN (:waiting) AND e.receivedOn <= :waitNotice)',
}

export interface NeedMoment {
  today: Day
  waitTargetWeeks: number
  /** The last moment at which a consent that ends within the notice still holds. */
  consentNotice: Date
}

export const needParameters = (
  viewer: Viewer,
  { today, waitTargetWeeks, consentNotice }: NeedMoment,
): SqlParameters => ({
  viewer: viewer.id,
  viewerRoles: [...viewer.roles],
  newlyQualified: viewer.newlyQualified,
  isLead: seesWholeClinic(viewer),
  now: now(),
  closed: closedStates,
  waiting: waitingStates,
  reviewNotice: addDays(today, reviewNoticeDays),
  waitNotice: addDays(today, waitNoticeDays - waitTargetWeeks * 7),
  consentNotice,
})

/** A consent that ends with this day or before is shown as ending. */
export const lastNoticeDay = (today: Day): Day => addDays(today, consentNoticeDays)
