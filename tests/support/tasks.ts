import { randomUUID } from 'node:crypto'
import { now } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { Task } from '../../server/entities/Task.ts'

/** A task nobody holds yet, with no child. Rows are written as the app account writes them. */
export const buildTask = async (given: Partial<Task> = {}): Promise<Task> => {
  const task = database().manager.create(Task, {
    id: randomUUID(),
    childId: null,
    kind: 'call',
    text: 'Call the family',
    dueOn: null,
    assigneeId: null,
    forRole: null,
    doneAt: null,
    doneById: null,
    createdAt: now(),
    ...given,
  })
  await database().manager.insert(Task, task)
  return task
}
