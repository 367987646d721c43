import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { within } from './scope.ts'
import { selectOne } from './sql.ts'

/** Takes the child's row, so that two acts that count or compare rows of one child come one after the other. */
export const lockChild = async (access: ChildAccess, tx: Tx): Promise<void> => {
  const scope = within(access, 'c.id')
  const row = await selectOne(
    `SELECT c.id FROM children c WHERE ${scope.sql} FOR UPDATE`,
    scope.parameters,
    tx,
  )
  if (!row) throw notFound()
}
