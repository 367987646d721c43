import { randomUUID } from 'node:crypto'
import type { Day } from '../../shared/days.ts'
import type { Role } from '../../shared/roles.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Task } from '../entities/Task.ts'

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
