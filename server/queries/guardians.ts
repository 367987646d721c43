import type { GuardianRelation, ParentalResponsibility } from '../../shared/guardians.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import { emailConsent } from './inForce.ts'
import { within } from './scope.ts'
import { flag, selectRows } from './sql.ts'

export interface GuardianRow {
  id: string
  name: string
  relation: GuardianRelation
  parentalResponsibility: ParentalResponsibility
  courtOrder: boolean
  safeToContact: boolean
  restricted: boolean
  email: string | null
  phone: string | null
  address: string | null
  account: 'none' | 'invited' | 'active' | 'disabled'
  emailConsent: 'none' | 'link' | 'attachment'
  version: number
}

type Flags = 'courtOrder' | 'safeToContact' | 'restricted'

/** The child's carers, for the clinic's staff. */
export const listGuardians = async (
  access: ChildAccess,
  onlyId: string | null = null,
): Promise<GuardianRow[]> => {
  const scope = within(access, 'g.childId')
  const rows = await selectRows<Omit<GuardianRow, Flags> & Record<Flags, number>>(
    `SELECT g.id, g.name, g.relation, g.parentalResponsibility, g.courtOrder, g.safeToContact, g.restricted, g.email,
       g.phone, g.address, g.version,
       CASE WHEN u.id IS NULL THEN 'none' WHEN u.disabledAt IS NOT NULL THEN 'disabled'
         WHEN u.passwordHash IS NULL THEN 'invited' ELSE 'active' END AS account,
       CASE WHEN ${emailConsent('email_attachment')} THEN 'attachment' WHEN ${emailConsent('email_link')} THEN 'link'
         ELSE 'none' END AS emailConsent
     FROM guardians g LEFT JOIN users u ON u.id = g.userId
     WHERE g.endedAt IS NULL AND ${scope.sql}
       ${onlyId === null ? '' : 'AND g.id = :onlyId'}
     ORDER BY g.createdAt, g.id`,
    { ...scope.parameters, now: now(), onlyId },
  )
  return rows.map((row) => ({
    ...row,
    courtOrder: flag(row.courtOrder),
    safeToContact: flag(row.safeToContact),
    restricted: flag(row.restricted),
  }))
}
