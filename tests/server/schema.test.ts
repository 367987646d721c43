import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { closeDatabase, createDataSource, database } from '../../server/dataSource.ts'
import { databaseProblems } from '../../server/setup/checkDatabase.ts'
import { openClinicDatabase } from '../support/clinicDatabase.ts'
import { testDatabaseAccess } from '../support/database.ts'

beforeAll(openClinicDatabase)
afterAll(closeDatabase)

const owner = async <T>(work: (query: (sql: string) => Promise<unknown>) => Promise<T>): Promise<T> => {
  const dataSource = createDataSource(testDatabaseAccess().migrate)
  await dataSource.initialize()
  try {
    return await work((sql) => dataSource.query(sql))
  } finally {
    await dataSource.destroy()
  }
}

describe('the schema', () => {
  it('leaves nothing to generate once the migrations have run', async () => {
    const dataSource = createDataSource(testDatabaseAccess().migrate)
    await dataSource.initialize()
    const difference = await dataSource.driver.createSchemaBuilder().log()
    await dataSource.destroy()
    expect(difference.upQueries.map((query) => query.query)).toEqual([])
  })

  it('passes the check of the boot as it stands', async () => {
    expect(await databaseProblems(database())).toEqual([])
  })

  it.each([
    ['a trigger is missing', 'DROP TRIGGER session_notes_keep', 'session_notes_keep'],
    [
      'the app account got a right too many',
      'GRANT DELETE ON audit_entries TO fanflower_app@127.0.0.1',
      'DELETE on audit_entries',
    ],
    [
      'a key cascades',
      'ALTER TABLE note_addenda ADD CONSTRAINT loose FOREIGN KEY (noteId) REFERENCES session_notes (id) ON DELETE CASCADE',
      'loose',
    ],
  ])('names the trouble when %s', async (_what, damage, named) => {
    await openClinicDatabase()
    await owner((query) => query(damage))
    expect((await databaseProblems(database())).join('\n')).toContain(named)
  })
})
