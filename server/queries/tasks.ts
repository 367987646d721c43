import type { Viewer } from '../access/actor.ts'
import type { Fragment } from './sql.ts'
import { staffScope } from './staffScope.ts'

/**
 * Tasks the viewer may know of, of rows `t`: those held by the person or one of their roles, and those of a child they
 * hold or lead. A task about a child stays hidden from people who may no longer see the child.
 */
export const taskScope = (viewer: Viewer): Fragment => {
  const clinical = staffScope(viewer, 't.childId', ['assignedTherapist', 'clinicLead'])
  const office = staffScope(viewer, 't.childId', ['administrator'])
  const mine = '(t.assigneeId = :scopeViewer OR t.forRole IN (:viewerRoles))'
  return {
    sql: `((t.childId IS NULL AND ${mine}) OR (t.childId IS NOT NULL AND (${clinical.sql} OR (${mine} AND ${office.sql}))))`,
    parameters: { ...clinical.parameters, ...office.parameters, viewerRoles: [...viewer.roles] },
  }
}
