import { staffRoles, type Role } from '../../shared/roles.ts'
import { actOfTask } from '../../shared/tasks.ts'
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

/** A task is finished by the person or the role that holds it, or by the lead, unless an act on the record does it. */
export const canFinishTask = (viewer: Viewer, { kind, assigneeId, forRole, doneAt }: HeldTask) =>
  doneAt === null &&
  actOfTask(kind) === null &&
  (assigneeId === viewer.id ||
    (forRole !== null && viewer.roles.includes(forRole)) ||
    viewer.roles.includes('clinicLead'))
