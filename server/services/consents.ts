import { randomUUID } from 'node:crypto'
import { momentOf } from '../../shared/clinicTime.ts'
import type { ConsentBasis, ConsentMethod, ConsentPurpose } from '../../shared/consents.ts'
import { addDays, type Day } from '../../shared/days.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Consent } from '../entities/Consent.ts'
import type { AuditFact } from './audit.ts'

export interface NewConsent {
  childId: string
  guardianId: string | null
  givenByName: string
  purpose: ConsentPurpose
  basis: ConsentBasis
  method: ConsentMethod
  /** The last day it holds; it ends with that day. */
  expiresOn: Day | null
  note: string | null
  recordedById: string
  relation: ChildRelation | null
}

/** Adds a consent that was checked before. A consent is never changed afterwards. */
export const insertConsent = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  timeZone: string,
  { expiresOn, note, relation, ...columns }: NewConsent,
): Promise<string> => {
  const id = randomUUID()
  await tx.insert(Consent, {
    id,
    ...columns,
    kind: 'given',
    withdrawsId: null,
    at: now(),
    expiresAt: expiresOn === null ? null : momentOf(addDays(expiresOn, 1), '00:00', timeZone),
    reason: note,
    recordedAt: now(),
  })
  record({
    action: 'consent.given',
    objectType: 'consent',
    objectId: id,
    childId: columns.childId,
    relation,
    detail: { purpose: columns.purpose, basis: columns.basis },
  })
  return id
}
