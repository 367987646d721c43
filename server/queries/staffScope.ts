import type { Viewer } from '../access/actor.ts'
import { childScope } from './scope.ts'
import type { Fragment } from './sql.ts'

export type StaffRelation = 'assignedTherapist' | 'clinicLead' | 'administrator'

/**
 * A person's own child is never seen through their staff role, and a restriction on a carer beats every other grant.
 * The parameters are those of `childScope`.
 */
const notOwnChild = (column: string) => `NOT EXISTS (SELECT 1 FROM guardians og WHERE og.childId = ${column}
  AND og.userId = :scopeViewer AND (og.restricted = 1 OR (og.verifiedAt <= :scopeNow
    AND (og.endedAt IS NULL OR og.endedAt > :scopeNow))))`

/**
 * Keeps a list to the children whom the viewer may see as a member of staff in one of these relations; the same
 * answer as `findChildAccess` gives child by child.
 */
export const staffScope = (viewer: Viewer, column: string, relations: readonly StaffRelation[]): Fragment => {
  const scopes = relations.map((relation) => childScope(viewer, relation, column))
  return {
    sql: `((${scopes.map((scope) => scope.sql).join(' OR ')}) AND ${notOwnChild(column)})`,
    parameters: Object.assign({}, ...scopes.map((scope) => scope.parameters), {
      ...childScope(viewer, 'guardian', column).parameters,
    }),
  }
}
