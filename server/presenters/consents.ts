import { isConsentInForce, type ConsentView } from '../../shared/consents.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { canRecordWithdrawal } from '../policies/consents.ts'
import type { ConsentRow } from '../queries/consents.ts'

export const presentConsent = (row: ConsentRow, access: ChildAccess, now: Date): ConsentView => {
  const inForce = isConsentInForce(
    { givenAt: row.at, expiresAt: row.expiresAt, withdrawnAt: row.withdrawnAt },
    now,
  )
  return {
    id: row.id,
    purpose: row.purpose,
    guardianId: row.guardianId,
    givenBy: row.givenByName,
    basis: row.basis,
    method: row.method,
    givenAt: row.at.toISOString(),
    expiresAt: row.expiresAt?.toISOString() ?? null,
    withdrawnAt: row.withdrawnAt?.toISOString() ?? null,
    withdrawalReason: row.withdrawalReason,
    inForce,
    note: row.note,
    can: { withdraw: canRecordWithdrawal(access, { inForce }) },
  }
}
