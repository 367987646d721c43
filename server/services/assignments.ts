import { randomUUID } from 'node:crypto'
import type { ChildRelation } from '../../shared/roles.ts'
import { alertTask } from '../../shared/tasks.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Assignment } from '../entities/Assignment.ts'
import { invalid } from '../errors.ts'
import { runsAt } from '../queries/inForce.ts'
import { execute, selectOne } from '../queries/sql.ts'
import { isActiveTherapist } from '../queries/therapists.ts'
import type { AuditFact } from './audit.ts'

/** Who holds the child now; the row stays locked until the transaction ends. */
export const currentTherapist = async (tx: Tx, childId: string): Promise<string | null> => {
  const row = await selectOne<{ therapistId: string }>(
    `SELECT a.therapistId FROM assignments a WHERE a.childId = :childId AND ${runsAt('a')}
     ORDER BY a.startedAt DESC, a.id LIMIT 1 FOR UPDATE`,
    { childId, now: now() },
    tx,
  )
  return row?.therapistId ?? null
}

/** Refuses (422) somebody who cannot hold this child: no therapist, a disabled account, the child's own carer. */
export const assertCanHold = async (tx: Tx, childId: string | null, therapistId: string): Promise<void> => {
  if (!(await isActiveTherapist(tx, therapistId)))
    throw invalid({ therapistId: 'Choose a therapist who works here now' })
  if (childId === null) return
  const carer = await selectOne(
    'SELECT g.id FROM guardians g WHERE g.childId = :childId AND g.userId = :therapistId LIMIT 1',
    { childId, therapistId },
    tx,
  )
  if (carer) throw invalid({ therapistId: 'This therapist is a carer of the child: choose a colleague' })
}

/** Tasks that the lead keeps only while a child has no therapist. */
const goWithTherapist = [alertTask, 'consent_withdrawn']

export interface NewAssignment {
  childId: string
  /** Null leaves the child without a therapist. */
  therapistId: string | null
  reason: string
  relation: ChildRelation | null
}

/**
 * Ends the hold of whoever had the child and gives it to the next therapist, with the tasks still open. The earlier
 * therapist's access ends with their next request.
 */
export const assign = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  { childId, therapistId, reason, relation }: NewAssignment,
): Promise<void> => {
  const before = await currentTherapist(tx, childId)
  if (before === therapistId) return
  if (before !== null)
    await execute(
      tx,
      `UPDATE assignments SET endedAt = :now, endReason = :reason
       WHERE childId = :childId AND (endedAt IS NULL OR endedAt > :now)`,
      { childId, now: now(), reason },
    )
  if (therapistId !== null) {
    await assertCanHold(tx, childId, therapistId)
    await tx.insert(Assignment, {
      id: randomUUID(),
      childId,
      therapistId,
      startedAt: now(),
      endedAt: null,
      reason,
      endReason: null,
    })
  }
  await execute(
    tx,
    `UPDATE tasks SET assigneeId = :therapistId, forRole = :role
     WHERE childId = :childId AND doneAt IS NULL
       AND (assigneeId = :before OR (forRole = 'clinicLead' AND kind IN (:goWithTherapist)))`,
    { childId, therapistId, role: therapistId === null ? 'clinicLead' : null, before, goWithTherapist },
  )
  record({
    action: therapistId === null ? 'child.unallocated' : 'child.allocated',
    objectType: 'user',
    objectId: therapistId ?? undefined,
    childId,
    relation,
    detail: { from: before },
  })
}
