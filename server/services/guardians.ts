import { randomUUID } from 'node:crypto'
import type { GuardianDetails } from '../../shared/guardians.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Guardian } from '../entities/Guardian.ts'

/** Adds a carer to a child, without an account. */
export const insertGuardian = async (
  tx: Tx,
  childId: string,
  details: GuardianDetails,
): Promise<Guardian> => {
  const guardian = tx.create(Guardian, {
    id: randomUUID(),
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
