import { randomUUID } from 'node:crypto'
import type { Day } from '../../shared/days.ts'
import type { Role } from '../../shared/roles.ts'
import { actOfTask } from '../../shared/tasks.ts'
import { isId } from '../../shared/fields.ts'
import { now } from '../clock.ts'
import type { Actor, Viewer } from '../access/actor.ts'
import type { Tx } from '../dataSource.ts'
import { Task } from '../entities/Task.ts'
import { conflict, forbidden, notFound } from '../errors.ts'
import { canFinishTask } from '../policies/tasks.ts'
import { taskScope } from '../queries/tasks.ts'
import { transact } from './transact.ts'

export interface NewTask {
  childId: string | null
  /** Stable word for programs, e.g. `red_flag`. */
  kind: string
  /** What to do, for people. */
  text: string
  dueOn: Day | null
  /** Who does it; null gives it to the role. */
  assigneeId: string | null
  /** Who does it when nobody is named. */
  otherwise: Role
}

/** Adds a task to the transaction of the act that calls for it. */
export const addTask = async (
  tx: Tx,
  { childId, kind, text, dueOn, assigneeId, otherwise }: NewTask,
): Promise<string> => {
  const id = randomUUID()
  await tx.insert(Task, {
    id,
    childId,
    kind,
    text,
    dueOn,
    assigneeId,
    forRole: assigneeId === null ? otherwise : null,
    doneAt: null,
    doneById: null,
    createdAt: now(),
  })
  return id
}

/** Marks a task as done. Not the viewer's to know of: 404; known but held by somebody else: 403; done before: 409. */
export const finishTask = (actor: Actor, viewer: Viewer, id: string): Promise<void> =>
  transact(actor, async (tx, record) => {
    if (!isId(id)) throw notFound()
    const scope = taskScope(viewer)
    const task = await tx
      .createQueryBuilder(Task, 't')
      .where(`t.id = :id AND ${scope.sql.replaceAll(':viewerRoles', ':...viewerRoles')}`, {
        ...scope.parameters,
        id,
      })
      .setLock('pessimistic_write')
      .getOne()
    if (!task) throw notFound()
    if (task.doneAt) throw conflict('closed', 'This was done already. Nothing was changed.')
    const act = actOfTask(task.kind)
    if (act !== null) throw conflict('answer_needed', act)
    if (!canFinishTask(viewer, task)) throw forbidden('This task is held by somebody else.')
    await tx.update(Task, { id }, { doneAt: now(), doneById: viewer.id })
    record({ action: 'task.finished', objectType: 'task', objectId: id, childId: task.childId })
  })
