import type { Viewer } from '../access/actor.ts'
import { childScope, restrictedFrom } from './scope.ts'
import type { Fragment } from './sql.ts'

export type StaffRelation = 'assignedTherapist' | 'clinicLead' | 'administrator'

/**
 * Keeps a list to the children whom the viewer may see as a member of staff in one of these relations; the same
 * answer as `findChildAccess` gives child by child. A person's own child is never seen through their staff role, and a
 * restriction on a carer beats every other grant. The parameters are those of `childScope`.
 */
export const staffScope = (viewer: Viewer, column: string, relations: readonly StaffRelation[]): Fragment => {
  const scopes = relations.map((relation) => childScope(viewer, relation, column))
  const asFamily = childScope(viewer, 'guardian', column)
  return {
    sql: `((${scopes.map((scope) => scope.sql).join(' OR ')}) AND NOT ${asFamily.sql}
      AND NOT ${restrictedFrom(column)})`,
    parameters: Object.assign({}, ...scopes.map((scope) => scope.parameters), asFamily.parameters),
  }
}
