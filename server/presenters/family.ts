import {
  consentConsequences,
  consentPurposeLabels,
  consentPurposes,
  type ConsentPurpose,
} from '../../shared/consents.ts'
import type { MyChildRow, MyChildView, MyConsent } from '../../shared/family.ts'
import type { ReceivedLetterRow } from '../../shared/letters.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import { mayGiveConsent, mayWithdrawConsent } from '../policies/family.ts'
import type { ConsentInForceRow, OwnChildRecord, OwnChildRow } from '../queries/family.ts'
import type { ReceivedLetterListRow } from '../queries/receivedLetters.ts'

export const presentOwnChildRow = (row: OwnChildRow): MyChildRow => ({
  id: row.id,
  name: row.name,
  therapist: row.therapist,
  unreadLetters: row.unreadLetters,
})

/** Another carer is not named: a foster carer's name, for one, is not everybody's to know. */
const somebodyElse = 'Another person who may decide for this child'

const presentConsent = (
  purpose: ConsentPurpose,
  child: OwnChildRecord,
  inForce: readonly ConsentInForceRow[],
): MyConsent => {
  const given = inForce.filter((row) => row.purpose === purpose)
  const consent = given.find((row) => row.guardianId === child.guardianId) ?? given[0] ?? null
  const mayWithdraw = consent !== null && mayWithdrawConsent(child, consent)
  return {
    purpose,
    label: consentPurposeLabels[purpose],
    consequence: consentConsequences[purpose],
    inForce: consent !== null,
    consentId: mayWithdraw ? consent.id : null,
    givenBy: consent && (consent.guardianId === child.guardianId ? consent.givenByName : somebodyElse),
    givenAt: consent && consent.at.toISOString(),
    can: { give: consent === null && mayGiveConsent(child), withdraw: mayWithdraw },
  }
}

const presentReceivedRow = (row: ReceivedLetterListRow): ReceivedLetterRow => ({
  id: row.id,
  childId: row.childId,
  kind: row.kind,
  sentAt: row.sentAt.toISOString(),
  openedAt: row.openedAt && row.openedAt.toISOString(),
})

export const presentOwnContact = (child: OwnChildRecord): MyChildView['ownContact'] => ({
  name: child.guardianName,
  email: child.email,
  phone: child.phone,
  address: child.address,
  version: child.version,
})

export const presentOwnChild = (
  child: OwnChildRecord,
  related: { letters: ReceivedLetterListRow[]; consents: ConsentInForceRow[]; goals: string[] },
  clinic: ClinicSettings,
): MyChildView => ({
  id: child.id,
  name: child.name,
  birthDate: child.birthDate,
  school: child.school,
  therapist: child.therapist,
  clinic: { name: clinic.clinicName, phone: clinic.clinicPhone, emergencyText: clinic.emergencyText },
  letters: related.letters.map(presentReceivedRow),
  consents: consentPurposes.map((purpose) => presentConsent(purpose, child, related.consents)),
  goals: related.goals,
  ownContact: presentOwnContact(child),
})
