import { randomUUID } from 'node:crypto'
import { addWorkingDays, type Day } from '../../shared/days.ts'
import type { ReferralFlag } from '../../shared/referralFlags.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Alert } from '../entities/Alert.ts'
import type { AuditFact } from './audit.ts'
import { addTask } from './tasks.ts'

/** Working days in which a sign that is due, but not overdue from the start, is looked at (clinic rule). */
const daysToLook = 5

const wordsOf = ({ text, words }: ReferralFlag) =>
  words === null ? text : `${text} Words of the referral: “${words.slice(0, 120)}”.`

/**
 * Puts the warning signs of a referral on the record, with a task for whoever holds the child, or for the lead. A sign
 * is a reason to look; what it means is for the therapist to decide.
 */
export const raiseReferralFlags = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  { childId, therapistId, today }: { childId: string; therapistId: string | null; today: Day },
  flags: readonly ReferralFlag[],
): Promise<void> => {
  for (const flag of flags) {
    const id = randomUUID()
    await tx.insert(Alert, {
      id,
      childId,
      flag: flag.id,
      text: wordsOf(flag),
      level: flag.level,
      raisedAt: now(),
      actedAt: null,
      actedById: null,
      action: null,
    })
    record({ action: 'alert.raised', objectType: 'alert', objectId: id, childId, detail: { flag: flag.id } })
    if (flag.level === 'soon') continue
    await addTask(tx, {
      childId,
      kind: 'red_flag',
      text: 'A warning sign stands on the referral: look at it and write down what was done',
      dueOn: flag.level === 'overdue' ? today : addWorkingDays(today, daysToLook),
      assigneeId: therapistId,
      otherwise: 'clinicLead',
    })
  }
}
