import { database } from '../../server/dataSource.ts'

/** Writes one row as the app account and gives it back with its version. */
export const insertRow = async <T extends { id: string }>(
  entity: new () => T,
  row: Partial<T> & { id: string },
): Promise<T> => {
  const made = database().manager.create(entity, row as never) as T
  await database().manager.insert(entity, made as never)
  return made
}
