import { referralDayProblems } from '../../../shared/birthDates.ts'
import { missingFromReferral, type DeclineReferral, type ReferralDetails } from '../../../shared/referrals.ts'
import { isId } from '../../../shared/fields.ts'
import type { Actor, Viewer } from '../../access/actor.ts'
import { now } from '../../clock.ts'
import type { Tx } from '../../dataSource.ts'
import { Referral } from '../../entities/Referral.ts'
import { SchoolClass } from '../../entities/SchoolClass.ts'
import { conflict, invalid, notFound } from '../../errors.ts'
import { isUndecided } from '../../policies/referrals.ts'
import { referralScope } from '../../queries/referrals.ts'
import { createOnce } from '../once.ts'
import { clinicToday, readSettings } from '../settings.ts'
import { transact } from '../transact.ts'
import { StaleWrite, updateIfCurrent } from '../versions.ts'

const assertDetails = async (tx: Tx, details: ReferralDetails) => {
  const problems = referralDayProblems(details, clinicToday(await readSettings()))
  if (Object.keys(problems).length > 0) throw invalid(problems)
  if (details.classId !== null && !(await tx.existsBy(SchoolClass, { id: details.classId })))
    throw invalid({ classId: 'This class is not on the list' })
}

/** The columns that repeat parts of the details for lists and for finding duplicates. */
const columnsOf = (details: ReferralDetails) => ({
  details,
  receivedOn: details.receivedOn,
  givenName: details.givenName,
  familyName: details.familyName,
  birthDate: details.birthDate,
  schoolClassId: details.classId,
  status: missingFromReferral(details).length === 0 ? ('new' as const) : ('incomplete' as const),
})

/** Enters a referral as it was sent in; what is missing keeps it from being accepted, not from being kept. */
export const enterReferral = (
  actor: Actor,
  viewer: Viewer,
  details: ReferralDetails,
  key: string | null,
): Promise<string> =>
  transact(actor, (tx, record) =>
    createOnce(
      tx,
      actor,
      record,
      { key, request: ['referral', details] },
      (id) => ({ action: 'referral.created', objectType: 'referral', objectId: id }),
      async (id) => {
        await assertDetails(tx, details)
        await tx.insert(Referral, {
          id,
          ...columnsOf(details),
          priority: null,
          childId: null,
          enteredById: viewer.id,
          decidedById: null,
          decidedAt: null,
          decisionReason: null,
          outcome: null,
          createdAt: now(),
        })
      },
    ),
  )

/**
 * Locks a referral for a decision. Absent or not the viewer's to see: 404. Decided meanwhile: 409. Throws StaleWrite
 * when it is not the version the person saw.
 */
export const lockUndecided = async (
  tx: Tx,
  viewer: Viewer,
  id: string,
  version: number,
): Promise<Referral> => {
  if (!isId(id)) throw notFound()
  const scope = referralScope(viewer)
  const referral = await tx
    .createQueryBuilder(Referral, 'r')
    // Whoever took the decision a moment ago hears that it is taken, not that there is nothing.
    .where(`r.id = :id AND (${scope.sql} OR r.decidedById = :decider)`, {
      ...scope.parameters,
      id,
      decider: viewer.id,
    })
    .setLock('pessimistic_write')
    .getOne()
  if (!referral) throw notFound()
  if (!isUndecided(referral.status))
    throw conflict('closed', 'This referral has been decided already. Nothing was changed.')
  if (referral.version !== version) throw new StaleWrite()
  return referral
}

/** Corrects or completes a referral that is not decided yet. Throws StaleWrite. */
export const changeReferral = (
  actor: Actor,
  viewer: Viewer,
  id: string,
  version: number,
  details: ReferralDetails,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    await lockUndecided(tx, viewer, id, version)
    await assertDetails(tx, details)
    await updateIfCurrent(tx, Referral, id, version, columnsOf(details))
    record({ action: 'referral.changed', objectType: 'referral', objectId: id })
  })

/** Closes a referral without a record: advice, another service, or not accepted; always with the reason. Throws StaleWrite. */
export const declineReferral = (
  actor: Actor,
  viewer: Viewer,
  id: string,
  version: number,
  { outcome, reason }: DeclineReferral,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    await lockUndecided(tx, viewer, id, version)
    await updateIfCurrent(tx, Referral, id, version, {
      status: 'declined',
      outcome,
      decisionReason: reason,
      decidedById: viewer.id,
      decidedAt: now(),
    })
    record({ action: 'referral.declined', objectType: 'referral', objectId: id, detail: { outcome } })
  })
