import { randomUUID } from 'node:crypto'
import { consentPurposeLabels, type ConsentMethod } from '../../shared/consents.ts'
import type { Day } from '../../shared/days.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Consent } from '../entities/Consent.ts'
import { conflict } from '../errors.ts'
import { selectOne } from '../queries/sql.ts'
import { currentTherapist } from './assignments.ts'
import { cancelDeliveriesForConsent } from './letterDeliveries.ts'
import { addTask } from './tasks.ts'

export interface Withdrawal {
  /** Who says stop, by name. */
  byName: string
  method: ConsentMethod
  reason: string | null
  /** The account that records it. */
  recordedById: string
  /** Today in the clinic, for the therapist's task. */
  today: Day
}

/**
 * Ends a consent from this moment: a new row that names the one it ends, what is queued on its strength is cancelled,
 * and the therapist gets a task. Call it under a lock on the child's row. Answers the new row's id. Throws 409
 * `closed` when there is nothing left to end.
 */
export const withdrawConsent = async (tx: Tx, consent: Consent, by: Withdrawal): Promise<string> => {
  const over = consent.expiresAt !== null && consent.expiresAt <= now()
  const earlier = await selectOne('SELECT id FROM consents WHERE withdrawsId = :id', { id: consent.id }, tx)
  if (consent.kind !== 'given' || over || earlier)
    throw conflict('closed', 'This consent has already ended. Nothing rests on it any more.')
  const id = randomUUID()
  await tx.insert(Consent, {
    id,
    childId: consent.childId,
    guardianId: consent.guardianId,
    purpose: consent.purpose,
    kind: 'withdrawn',
    withdrawsId: consent.id,
    basis: consent.basis,
    method: by.method,
    givenByName: by.byName,
    at: now(),
    expiresAt: null,
    reason: by.reason,
    recordedById: by.recordedById,
    recordedAt: now(),
  })
  await cancelDeliveriesForConsent(tx, consent)
  await addTask(tx, {
    childId: consent.childId,
    kind: 'consent_withdrawn',
    text: `A consent was withdrawn (${consentPurposeLabels[consent.purpose]}): see what has to stop or change`,
    dueOn: by.today,
    assigneeId: await currentTherapist(tx, consent.childId),
    otherwise: 'clinicLead',
  })
  return id
}
