import { randomUUID } from 'node:crypto'
import { momentOf } from '../../shared/clinicTime.ts'
import { consentProblem } from '../../shared/consentRules.ts'
import {
  perGuardianPurposes,
  type ConsentBasis,
  type ConsentGiven,
  type ConsentMethod,
  type ConsentPurpose,
  type ConsentWithdrawal,
} from '../../shared/consents.ts'
import { addDays, type Day } from '../../shared/days.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Child } from '../entities/Child.ts'
import { Consent } from '../entities/Consent.ts'
import { Guardian } from '../entities/Guardian.ts'
import { conflict, invalid } from '../errors.ts'
import { consentHolds } from '../queries/inForce.ts'
import { lockChild } from '../queries/lockChild.ts'
import { findForChild } from '../queries/scope.ts'
import { selectOne, selectRows } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { withdrawConsent } from './consentWithdrawal.ts'
import { clinicToday, readSettings } from './settings.ts'
import { transact } from './transact.ts'

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

/**
 * Adds a consent that was checked before. It takes the place of an earlier one for the same purpose (and carer, where it
 * belongs to one), so that stopping it once stops it. A consent is never changed afterwards.
 */
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
  await endEarlier(tx, id, columns)
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

/** E-mail consent is one carer's; of every other purpose the child has one, whoever gave it. */
const boundTo = ({ purpose, guardianId }: Pick<NewConsent, 'purpose' | 'guardianId'>) =>
  perGuardianPurposes.includes(purpose) ? guardianId : null

const endEarlier = async (
  tx: Tx,
  newId: string,
  { childId, purpose, guardianId, recordedById }: Omit<NewConsent, 'expiresOn' | 'note' | 'relation'>,
) => {
  const earlier = await selectRows<Pick<Consent, 'id' | 'guardianId' | 'basis' | 'method' | 'givenByName'>>(
    `SELECT f.id, f.guardianId, f.basis, f.method, f.givenByName FROM consents f
     WHERE f.childId = :childId AND f.purpose = :purpose AND f.id <> :newId
       AND (:bound IS NULL OR f.guardianId = :bound) AND ${consentHolds('f')}`,
    { childId, purpose, newId, bound: boundTo({ purpose, guardianId }), now: now() },
    tx,
  )
  for (const { id, ...given } of earlier)
    await tx.insert(Consent, {
      ...given,
      id: randomUUID(),
      childId,
      purpose,
      kind: 'withdrawn',
      withdrawsId: id,
      at: now(),
      expiresAt: null,
      reason: 'Replaced by a newer consent',
      recordedById,
      recordedAt: now(),
    })
}

/** The carer named in the form, of this child; somebody else's carer is no choice at all. */
const carerOf = async (
  tx: Tx,
  { childId }: ChildAccess,
  guardianId: string | null,
): Promise<Guardian | null> => {
  if (guardianId === null) return null
  const carer = await tx.findOneBy(Guardian, { id: guardianId, childId })
  if (!carer || carer.endedAt !== null) throw invalid({ guardianId: 'Choose a carer of this child' })
  return carer
}

const holdsWithoutEnd = async (tx: Tx, childId: string, given: Pick<NewConsent, 'purpose' | 'guardianId'>) =>
  (await selectOne(
    `SELECT f.id FROM consents f WHERE f.childId = :childId AND f.purpose = :purpose AND f.expiresAt IS NULL
       AND (:bound IS NULL OR f.guardianId = :bound) AND ${consentHolds('f')} LIMIT 1`,
    { childId, purpose: given.purpose, bound: boundTo(given), now: now() },
    tx,
  )) !== null

/**
 * Records a consent that a family gave to a member of staff. One that holds without end need not be given again; one
 * that will end can be renewed. Answers the new row's id.
 */
export const recordConsent = async (
  actor: Actor,
  access: ChildAccess,
  { guardianId, expiresOn, note, ...given }: ConsentGiven,
): Promise<string> => {
  const settings = await readSettings()
  const today = clinicToday(settings)
  if (given.method === 'signed_in')
    throw invalid({ method: 'Only carers themselves consent by signing in: choose how it was given' })
  return transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    const carer = await carerOf(tx, access, guardianId)
    const problem = consentProblem({ ...given, expiresOn, note }, carer, today)
    if (problem)
      throw invalid({ [problem.field === 'carer' ? 'guardianId' : problem.field]: problem.message })
    if (await holdsWithoutEnd(tx, access.childId, { purpose: given.purpose, guardianId }))
      throw conflict('duplicate', 'This consent is in force already. Nothing had to be changed.')
    return insertConsent(tx, record, settings.timeZone, {
      ...given,
      childId: access.childId,
      guardianId,
      givenByName: carer?.name ?? (await ownName(tx, access)),
      expiresOn,
      note,
      recordedById: access.viewer.id,
      relation: access.relation,
    })
  })
}

/** A young person who consents alone is named as themselves. */
const ownName = async (tx: Tx, { childId }: ChildAccess): Promise<string> => {
  const { givenName, familyName } = await tx.findOneByOrFail(Child, { id: childId })
  return `${givenName} ${familyName}`
}

/** Records that a family stopped a consent. It ends at once, and so does everything queued on its strength. */
export const recordWithdrawal = async (
  actor: Actor,
  access: ChildAccess,
  consentId: string,
  { reason }: ConsentWithdrawal,
): Promise<void> => {
  const today = clinicToday(await readSettings())
  await transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    const consent = await findForChild(access, Consent, consentId, tx)
    await withdrawConsent(tx, consent, {
      byName: consent.givenByName,
      // The form does not ask how it was said; who wrote it down is kept.
      method: 'in_person',
      reason,
      recordedById: access.viewer.id,
      today,
    })
    record({
      action: 'consent.withdrawn',
      objectType: 'consent',
      objectId: consentId,
      childId: access.childId,
      relation: access.relation,
      detail: { purpose: consent.purpose },
    })
  })
}
