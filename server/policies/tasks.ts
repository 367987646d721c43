import { staffRoles, type Role } from '../../shared/roles.ts'
import { alertTask } from '../../shared/tasks.ts'
import type { Viewer } from '../access/actor.ts'
import { rolePolicy } from './policy.ts'

export const taskPolicies = {
  finish: rolePolicy('tasks.finish', staffRoles, 'write'),
}

interface HeldTask {
  kind: string
  assigneeId: string | null
  forRole: Role | null
  doneAt: Date | null
}

/** A task is finished by the person or the role that holds it, or by the lead; that of a warning sign by its answer. */
export const canFinishTask = (viewer: Viewer, { kind, assigneeId, forRole, doneAt }: HeldTask) =>
  doneAt === null &&
  kind !== alertTask &&
  (assigneeId === viewer.id ||
    (forRole !== null && viewer.roles.includes(forRole)) ||
    viewer.roles.includes('clinicLead'))
