import { randomUUID } from 'node:crypto'
import { addWorkingDays } from '../../shared/days.ts'
import type { GuardianDetails, GuardianRestriction } from '../../shared/guardians.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Guardian } from '../entities/Guardian.ts'
import { conflict, forbidden, notFound } from '../errors.ts'
import { canRestrictGuardian } from '../policies/guardians.ts'
import { findForChild } from '../queries/scope.ts'
import { currentTherapist } from './assignments.ts'
import { endLinksOf } from './answerLinkEnds.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { cancelDeliveriesToGuardian } from './letterDeliveries.ts'
import { clinicToday, readSettings } from './settings.ts'
import { addTask } from './tasks.ts'
import { transact } from './transact.ts'
import { updateIfCurrent } from './versions.ts'

/** Adds a carer to a child, without an account. */
export const insertGuardian = async (
  tx: Tx,
  childId: string,
  details: GuardianDetails,
  id: string = randomUUID(),
): Promise<Guardian> => {
  const guardian = tx.create(Guardian, {
    id,
    childId,
    userId: null,
    ...details,
    restricted: false,
    restrictedReason: null,
    verifiedAt: null,
    endedAt: null,
    createdAt: now(),
  })
  await tx.insert(Guardian, guardian)
  return guardian
}

export const guardianFact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action,
  objectType: 'guardian',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

/** The carer of this child, locked for a change; ended links are as good as absent. */
export const lockGuardian = async (tx: Tx, access: ChildAccess, id: string): Promise<Guardian> => {
  const guardian = await findForChild(access, Guardian, id, tx, { lock: true })
  if (guardian.endedAt !== null && guardian.endedAt <= now()) throw notFound()
  return guardian
}

/** Answers the id of the new carer; the same form sent again answers the first one's. */
export const addGuardian = (
  actor: Actor,
  access: ChildAccess,
  details: GuardianDetails,
  key: string | null,
): Promise<string> =>
  transact(actor, (tx, record) =>
    createOnce(
      tx,
      actor,
      record,
      { key, request: ['guardian', access.childId, details] },
      (id) => guardianFact(access, 'guardian.created', id),
      async (id) => {
        await insertGuardian(tx, access.childId, details, id)
      },
    ),
  )

/**
 * Changes what is known of a carer. Where writing is no longer safe nothing queued leaves; links that went to an address
 * of before end; where parental
 * responsibility has ended the consents that rest on it are looked at by the therapist. Throws StaleWrite.
 */
export const changeGuardian = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
  details: GuardianDetails,
): Promise<void> => {
  const today = clinicToday(await readSettings())
  await transact(actor, async (tx, record) => {
    const before = await lockGuardian(tx, access, id)
    await updateIfCurrent(tx, Guardian, id, version, details)
    const isUnsafeNow = before.safeToContact && !details.safeToContact
    if (isUnsafeNow) await cancelDeliveriesToGuardian(tx, id)
    if (isUnsafeNow || before.email !== details.email)
      await endLinksOf(tx, record, access, { guardianId: id, why: isUnsafeNow ? 'contact' : 'address' })
    if (before.parentalResponsibility === 'yes' && details.parentalResponsibility !== 'yes')
      await addTask(tx, {
        childId: access.childId,
        kind: 'responsibility_changed',
        text: 'Parental responsibility of a carer changed: see which consents still hold',
        dueOn: addWorkingDays(today, 1),
        assigneeId: await currentTherapist(tx, access.childId),
        otherwise: 'clinicLead',
      })
    record(guardianFact(access, 'guardian.changed', id))
  })
}

/** Closes the record to a carer at once and stops what is queued to them, or lifts that again. */
export const restrictGuardian = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  { restricted, reason }: GuardianRestriction,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const guardian = await lockGuardian(tx, access, id)
    if (guardian.restricted === restricted)
      throw conflict(
        'closed',
        restricted ? 'This carer is restricted already.' : 'No restriction is in place.',
      )
    if (!canRestrictGuardian(access, guardian)) throw forbidden('Only the clinic lead lifts a restriction.')
    await updateIfCurrent(tx, Guardian, id, guardian.version, { restricted, restrictedReason: reason })
    if (restricted) {
      await cancelDeliveriesToGuardian(tx, id)
      await endLinksOf(tx, record, access, { guardianId: id, why: 'contact' })
    }
    record(guardianFact(access, restricted ? 'guardian.restricted' : 'guardian.restriction_lifted', id))
  })
