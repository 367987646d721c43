import type { Day } from '../../shared/days.ts'
import type { ReferralStatus } from '../../shared/referrals.ts'
import type { Viewer } from '../access/actor.ts'
import type { Tx } from '../dataSource.ts'
import { selectRows } from './sql.ts'

export interface NamedChild {
  givenName: string
  familyName: string
  birthDate: Day
}

export interface SameChildRow {
  kind: 'child' | 'referral'
  id: string
  recordNumber: string | null
  givenName: string
  familyName: string
  birthDate: Day
  status: ReferralStatus | null
}

const sameName = (table: string) => `${table}.familyName = :familyName AND ${table}.birthDate = :birthDate`

/**
 * Children of the clinic, and referrals not yet decided, with this name and birth date. Upper and lower case and
 * accents do not count; a child is also found by the name they go by. `lock` reads what others have just committed and
 * holds off twins until the transaction ends. With a `reader` a child whose restricted carer the reader is stays out: a
 * restriction beats every other grant.
 */
export const listSameChild = (
  { givenName, familyName, birthDate }: NamedChild,
  exceptReferralId: string | null,
  tx?: Tx,
  { lock = false, reader = null }: { lock?: boolean; reader?: Viewer | null } = {},
): Promise<SameChildRow[]> =>
  lock
    ? selectRows<SameChildRow>(
        `${children} FOR UPDATE`,
        { givenName, familyName, birthDate, reader: null },
        tx,
      )
    : selectRows<SameChildRow>(
        `${children} UNION ALL SELECT 'referral', r.id, NULL, r.givenName, r.familyName, r.birthDate, r.status
         FROM referrals r WHERE r.status IN ('new', 'incomplete') AND r.givenName = :givenName
           AND ${sameName('r')} AND (:except IS NULL OR r.id <> :except) LIMIT 20`,
        { givenName, familyName, birthDate, except: exceptReferralId, reader: reader?.id ?? null },
        tx,
      )

const children = `SELECT 'child' AS kind, c.id, c.recordNumber, c.givenName, c.familyName, c.birthDate, NULL AS status
  FROM children c WHERE (c.givenName = :givenName OR c.preferredName = :givenName) AND ${sameName('c')}
    AND (:reader IS NULL OR NOT EXISTS (SELECT 1 FROM guardians xg WHERE xg.childId = c.id AND xg.userId = :reader
      AND xg.restricted = 1))`
