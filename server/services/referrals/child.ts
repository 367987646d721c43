import { randomUUID } from 'node:crypto'
import { missingFromReferral, type AcceptReferral } from '../../../shared/referrals.ts'
import type { GuardianDetails } from '../../../shared/guardians.ts'
import type { Viewer } from '../../access/actor.ts'
import { now } from '../../clock.ts'
import type { Tx } from '../../dataSource.ts'
import { Child } from '../../entities/Child.ts'
import { Guardian } from '../../entities/Guardian.ts'
import type { Referral } from '../../entities/Referral.ts'
import { invalid } from '../../errors.ts'
import { listSameChild, type SameChildRow } from '../../queries/sameChild.ts'
import { selectOne } from '../../queries/sql.ts'
import { staffScope } from '../../queries/staffScope.ts'
import type { AuditFact } from '../audit.ts'
import { insertGuardian } from '../guardians.ts'
import { nextRecordNumber } from '../recordNumbers.ts'

/** Thrown before a second record is made of a child who may be on the register; says who is known. */
export class SameChildKnown extends Error {
  readonly known: readonly SameChildRow[]

  constructor(known: readonly SameChildRow[]) {
    super('A child of this name and birth date is known')
    this.known = known
  }
}

export interface ChildOfReferral {
  childId: string
  /** In the order of the referral's carers. */
  guardians: Guardian[]
}

/**
 * A new record from a complete referral. When a child of this name and birth date is known the person must have said
 * that this is another one; throws SameChildKnown otherwise.
 */
export const createChild = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  { details, receivedOn }: Referral,
  decision: AcceptReferral,
): Promise<ChildOfReferral> => {
  const missing = missingFromReferral(details)
  if (missing.length > 0)
    throw invalid({ form: `This referral cannot be accepted yet: ${missing.join(', ')}.` })
  // Taking the number first makes two referrals of one child that are accepted at once wait for each other.
  const recordNumber = await nextRecordNumber(tx, Number(receivedOn.slice(0, 4)))
  const known = await listSameChild(details, null, tx, { lock: true })
  if (known.length > 0 && !decision.differentChild) throw new SameChildKnown(known)
  const childId = randomUUID()
  await tx.insert(Child, {
    id: childId,
    recordNumber,
    givenName: details.givenName,
    familyName: details.familyName,
    preferredName: details.preferredName,
    birthDate: details.birthDate,
    homeLanguages: details.homeLanguages,
    interpreterLanguage: details.interpreterLanguage,
    scriptDirection: details.scriptDirection,
    lookedAfter: details.lookedAfter,
    consentsForSelf: false,
    writingHand: null,
    schoolClassId: details.classId,
    nextReviewOn: null,
    createdAt: now(),
  })
  record({ action: 'child.created', objectType: 'child', objectId: childId, childId })
  const guardians: Guardian[] = []
  for (const carer of details.carers) guardians.push(await insertGuardian(tx, childId, carer))
  return { childId, guardians }
}

/**
 * Joins a referral to a child on the register: one of the same name and birth date, or one the viewer may see.
 * Carers already known stay as they are; the others are added. The referral itself is kept whole.
 */
export const joinChild = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  viewer: Viewer,
  { id, details }: Referral,
  childId: string,
): Promise<ChildOfReferral> => {
  const scope = staffScope(viewer, 'c.id', ['assignedTherapist', 'clinicLead'])
  const mayChoose =
    (await listSameChild(details, id, tx)).some((row) => row.kind === 'child' && row.id === childId) ||
    (await selectOne(
      `SELECT c.id FROM children c WHERE c.id = :childId AND ${scope.sql}`,
      { childId, ...scope.parameters },
      tx,
    )) !== null
  if (!mayChoose) throw invalid({ existingChildId: 'Choose one of the children shown' })
  const known = await tx
    .createQueryBuilder(Guardian, 'g')
    .where('g.childId = :childId AND g.endedAt IS NULL', { childId })
    .orderBy('g.createdAt')
    .setLock('pessimistic_write')
    .getMany()
  const guardians: Guardian[] = []
  for (const carer of details.carers)
    guardians.push(
      known.find((guardian) => isSamePerson(guardian, carer)) ?? (await insertGuardian(tx, childId, carer)),
    )
  record({ action: 'child.referral_joined', objectType: 'referral', objectId: id, childId })
  return { childId, guardians }
}

const plain = (value: string) => value.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase()

/** The same name; two carers may share an address, so an e-mail alone says nothing. */
const isSamePerson = (guardian: Guardian, carer: GuardianDetails) =>
  plain(guardian.name) === plain(carer.name)
