import { perGuardianPurposes, type ConsentPurpose } from '../../shared/consents.ts'
import type { OwnContact } from '../../shared/guardians.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { Consent } from '../entities/Consent.ts'
import { Guardian } from '../entities/Guardian.ts'
import { conflict, forbidden, notFound } from '../errors.ts'
import { mayGiveConsent, mayWithdrawConsent } from '../policies/family.ts'
import { findOwnChild, listConsentsInForce } from '../queries/family.ts'
import { lockChild } from '../queries/lockChild.ts'
import { findForChild } from '../queries/scope.ts'
import type { AuditFact } from './audit.ts'
import { withdrawConsent } from './consentWithdrawal.ts'
import { insertConsent } from './consents.ts'
import { once } from './once.ts'
import { clinicToday, readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { updateIfCurrent } from './versions.ts'

const fact = (access: ChildAccess, action: string, objectType: string, objectId: string): AuditFact => ({
  action,
  objectType,
  objectId,
  childId: access.childId,
  relation: access.relation,
})

/** Changes the viewer's own phone and address for this child. Throws StaleWrite when somebody saved in between. */
export const changeOwnContact = (
  actor: Actor,
  access: ChildAccess,
  version: number,
  { phone, address }: OwnContact,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    if (access.guardianId === null) throw notFound()
    const own = await findForChild(access, Guardian, access.guardianId, tx, { lock: true })
    await updateIfCurrent(tx, Guardian, own.id, version, { phone, address })
    record(fact(access, 'guardian.contact_changed', 'guardian', own.id))
  })

/** A carer agrees to one purpose, signed in. E-mail consent is bound to this carer alone. */
export const giveOwnConsent = async (
  actor: Actor,
  access: ChildAccess,
  purpose: ConsentPurpose,
  key: string | null,
): Promise<void> => {
  const { timeZone } = await readSettings()
  await transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    const own = await findOwnChild(access, tx)
    if (!mayGiveConsent(own))
      throw forbidden('Only a person who may decide for this child can agree to this.')
    const request = ['consent', access.childId, purpose]
    const { again } = await once(tx, actor, { key, request }, async () => {
      const inForce = await listConsentsInForce(access, tx)
      if (inForce.some((consent) => consent.purpose === purpose))
        throw conflict('duplicate', 'This has been agreed to already. Nothing had to be changed.')
      await insertConsent(tx, record, timeZone, {
        childId: access.childId,
        guardianId: own.guardianId,
        givenByName: own.guardianName,
        purpose,
        basis: own.relation === 'self' ? 'young_person_competent' : 'parental_responsibility',
        method: 'signed_in',
        expiresOn: null,
        note: null,
        recordedById: access.viewer.id,
        relation: access.relation,
      })
    })
    if (again) record(fact(access, 'consent.asked_again', 'child', access.childId))
  })
}

/** A carer stops a consent; it ends at once. Another carer's e-mail choice does not exist for them. */
export const withdrawOwnConsent = async (
  actor: Actor,
  access: ChildAccess,
  consentId: string,
  reason: string | null,
): Promise<void> => {
  const today = clinicToday(await readSettings())
  await transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    const own = await findOwnChild(access, tx)
    const consent = await findForChild(access, Consent, consentId, tx)
    if (perGuardianPurposes.includes(consent.purpose) && consent.guardianId !== own.guardianId)
      throw notFound()
    if (!mayWithdrawConsent(own, consent))
      throw forbidden('Only a person who may decide for this child can stop this. Please call the clinic.')
    await withdrawConsent(tx, consent, {
      byName: own.guardianName,
      method: 'signed_in',
      reason,
      recordedById: access.viewer.id,
      today,
    })
    record(fact(access, 'consent.withdrawn', 'consent', consent.id))
  })
}
