import type { CaseloadRow } from '../../shared/caseload.ts'
import { needsOf, type NeedRules } from '../../shared/caseloadNeeds.ts'
import { addDays, dayOf, formatAge } from '../../shared/days.ts'
import { waitDays, waitingStates } from '../../shared/waits.ts'
import type { CaseloadRecord } from '../queries/caseload.ts'
import { fullName } from './children/header.ts'

export const presentCaseloadRow = (record: CaseloadRecord, rules: NeedRules): CaseloadRow => ({
  id: record.id,
  recordNumber: record.recordNumber,
  name: fullName(record),
  birthDate: record.birthDate,
  age: formatAge(record.birthDate, rules.today),
  school: record.schoolName,
  className: record.className,
  state: record.state,
  writingHand: record.writingHand,
  therapist: record.therapist,
  nextReviewOn: record.nextReviewOn,
  lastSeenOn: record.lastSeenOn,
  waitingDays: waitingStates.includes(record.state) ? waitDays(record.receivedOn, rules.today) : null,
  needs: needsOf(
    {
      ...record,
      // Stored as the midnight after the last day.
      consentEndsOn: record.consentEndsAt && addDays(dayOf(record.consentEndsAt, rules.timeZone), -1),
    },
    rules,
  ),
})
