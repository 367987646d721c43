import type { ChildIdentity } from '../../../shared/children.ts'
import type { ChildAccess } from '../../access/childAccess.ts'
import type { Tx } from '../../dataSource.ts'
import { notFound } from '../../errors.ts'
import { within } from '../scope.ts'
import { flag, selectOne } from '../sql.ts'

export interface IdentityRow extends ChildIdentity {
  id: string
  recordNumber: string
  version: number
}

export const findIdentity = async (access: ChildAccess, tx?: Tx): Promise<IdentityRow> => {
  const scope = within(access, 'c.id')
  const row = await selectOne<
    Omit<IdentityRow, 'lookedAfter' | 'consentsForSelf'> & { lookedAfter: number; consentsForSelf: number }
  >(
    `SELECT c.id, c.recordNumber, c.givenName, c.familyName, c.preferredName, c.birthDate, c.homeLanguages,
       c.interpreterLanguage, c.scriptDirection, c.schoolClassId AS classId, c.lookedAfter, c.consentsForSelf, c.version
     FROM children c WHERE ${scope.sql}`,
    scope.parameters,
    tx,
  )
  if (!row) throw notFound()
  return { ...row, lookedAfter: flag(row.lookedAfter), consentsForSelf: flag(row.consentsForSelf) }
}
