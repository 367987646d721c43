import { ageBand } from '../../shared/birthDates.ts'
import { daysBetween, type Day } from '../../shared/days.ts'
import {
  missingFromReferral,
  referralStatusLabels,
  type PossibleDuplicate,
  type ReferralRow,
  type ReferralView,
} from '../../shared/referrals.ts'
import type { Viewer } from '../access/actor.ts'
import {
  canAcceptReferral,
  canChangeReferral,
  canDeclineReferral,
  isUndecided,
} from '../policies/referrals.ts'
import type { ReferralListRow, ReferralRecord } from '../queries/referrals.ts'
import type { SameChildRow } from '../queries/sameChild.ts'

export const presentReferralRow = (row: ReferralListRow, today: Day): ReferralRow => ({
  id: row.id,
  receivedOn: row.receivedOn,
  source: row.source,
  status: row.status,
  priority: row.priority,
  childName: row.named ? `${row.givenName} ${row.familyName}` : null,
  birthDate: row.named ? row.birthDate : null,
  ageBand: ageBand(row.birthDate, today),
  // The school with the age band may be enough to recognise a child.
  school: row.named ? (row.schoolName ?? row.schoolNote) : null,
  concerns: row.concerns,
  missing: isUndecided(row.status)
    ? missingFromReferral({
        carers: row.responsibilities.map((parentalResponsibility) => ({ parentalResponsibility })),
        classId: row.schoolClassId,
        schoolNote: row.schoolNote,
      })
    : [],
  waitingDays: daysBetween(row.receivedOn, today),
})

/** Name and birth date as the asker knows them already, the record number, and no clinical state. */
export const presentDuplicate = (row: SameChildRow): PossibleDuplicate => ({
  kind: row.kind,
  id: row.id,
  recordNumber: row.recordNumber,
  name: `${row.givenName} ${row.familyName}`,
  birthDate: row.birthDate,
  status: row.status === null ? 'On the register' : referralStatusLabels[row.status],
})

export const presentReferral = (
  record: ReferralRecord,
  sameChild: readonly SameChildRow[],
  viewer: Viewer,
): ReferralView => {
  const { details, status } = record
  const decidable = { status, childKnown: sameChild.some((row) => row.kind === 'child') }
  const canAccept = canAcceptReferral(viewer, decidable)
  return {
    id: record.id,
    receivedOn: details.receivedOn,
    source: details.source,
    referrerName: details.referrerName,
    referrerRole: details.referrerRole,
    referrerEmail: details.referrerEmail,
    referrerPhone: details.referrerPhone,
    reason: details.reason,
    concerns: details.concerns,
    givenName: details.givenName,
    familyName: details.familyName,
    preferredName: details.preferredName,
    birthDate: details.birthDate,
    homeLanguages: details.homeLanguages,
    interpreterLanguage: details.interpreterLanguage,
    scriptDirection: details.scriptDirection,
    classId: details.classId,
    schoolNote: details.schoolNote,
    lookedAfter: details.lookedAfter,
    carers: details.carers,
    status,
    school: record.schoolName,
    className: record.className,
    missing: isUndecided(status) ? missingFromReferral(details) : [],
    duplicates: isUndecided(status) ? sameChild.map(presentDuplicate) : [],
    childId: record.childId,
    recordNumber: record.recordNumber,
    decidedBy: record.decidedBy,
    decidedAt: record.decidedAt?.toISOString() ?? null,
    decisionReason: record.decisionReason,
    outcome: record.outcome,
    version: record.version,
    can: {
      change: canChangeReferral(viewer, decidable),
      accept: canAccept,
      decline: canDeclineReferral(viewer, decidable),
      allocate: canAccept,
    },
  }
}
