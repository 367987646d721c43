import type { CareDetails } from '../../../shared/children.ts'
import type { ChildAccess } from '../../access/childAccess.ts'
import { notFound } from '../../errors.ts'
import { within } from '../scope.ts'
import { selectOne } from '../sql.ts'

export interface CareRow extends CareDetails {
  version: number
}

/** What the therapist keeps on the child beyond identity. */
export const findCare = async (access: ChildAccess): Promise<CareRow> => {
  const scope = within(access, 'c.id')
  const row = await selectOne<CareRow>(
    `SELECT c.writingHand, c.nextReviewOn, c.strengths, c.version FROM children c WHERE ${scope.sql}`,
    scope.parameters,
  )
  if (!row) throw notFound()
  return row
}
