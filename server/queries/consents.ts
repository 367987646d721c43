import type { ConsentBasis, ConsentMethod, ConsentPurpose } from '../../shared/consents.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { within } from './scope.ts'
import { selectRows } from './sql.ts'

export interface ConsentRow {
  id: string
  purpose: ConsentPurpose
  guardianId: string | null
  givenByName: string
  basis: ConsentBasis
  method: ConsentMethod
  at: Date
  expiresAt: Date | null
  note: string | null
  withdrawnAt: Date | null
  withdrawalReason: string | null
}

/** Every consent ever given for the child, each with its withdrawal where there is one; the newest first. */
export const listConsents = (access: ChildAccess, onlyId: string | null = null): Promise<ConsentRow[]> => {
  const scope = within(access, 'f.childId')
  return selectRows<ConsentRow>(
    `SELECT f.id, f.purpose, f.guardianId, f.givenByName, f.basis, f.method, f.at, f.expiresAt, f.reason AS note,
       w.at AS withdrawnAt, w.reason AS withdrawalReason
     FROM consents f LEFT JOIN consents w ON w.withdrawsId = f.id
     WHERE f.kind = 'given' AND ${scope.sql} ${onlyId === null ? '' : 'AND f.id = :onlyId'}
     ORDER BY f.at DESC, f.id`,
    { ...scope.parameters, onlyId },
  )
}
