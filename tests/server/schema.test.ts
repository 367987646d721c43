import { spawnSync } from 'node:child_process'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { closeDatabase, createDataSource, database, openDatabase } from '../../server/dataSource.ts'
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
    [
      'the app account lost a right',
      'REVOKE INSERT ON consents FROM fanflower_app@127.0.0.1',
      'INSERT on consents',
    ],
    ['a migration is pending', 'DELETE FROM migrations ORDER BY id DESC LIMIT 1', 'migration is pending'],
  ])('names the trouble when %s', async (_what, damage, named) => {
    await openClinicDatabase()
    await owner((query) => query(damage))
    expect((await databaseProblems(database())).join('\n')).toContain(named)
  })

  it.each([
    ['the SQL mode is not strict', "SET SESSION sql_mode = ''", 'SQL mode'],
    ['statements have no time limit', 'SET SESSION max_statement_time = 0', 'time limit'],
  ])('names the trouble when %s', async (_what, damage, named) => {
    await openClinicDatabase()
    await database().query(damage)
    expect((await databaseProblems(database())).join('\n')).toContain(named)
  })

  it('names the trouble when the database is not utf8mb4', async () => {
    await openClinicDatabase()
    const { app } = testDatabaseAccess()
    await owner((query) => query(`ALTER DATABASE ${app.database} CHARACTER SET latin1`))
    await closeDatabase()
    await openDatabase(app)
    expect((await databaseProblems(database())).join('\n')).toContain('utf8mb4')
  })

  it('keeps the server from starting, with the name of the trouble and exit code 1', async () => {
    await openClinicDatabase()
    await owner((query) => query('DROP TRIGGER letters_keep'))
    const { app } = testDatabaseAccess()
    const started = spawnSync(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
      encoding: 'utf8',
      timeout: 30_000,
      env: {
        PATH: process.env.PATH,
        NODE_ENV: 'production',
        DATABASE_URL: `mysql://${app.user}:${encodeURIComponent(app.password)}@${app.host}:${app.port}/${app.database}`,
        SMTP_URL: 'smtp://127.0.0.1:1',
      },
    })
    expect(started.status).toBe(1)
    expect(started.stderr).toContain('the trigger letters_keep is missing')
    expect(started.stderr).not.toContain(app.password)
  }, 40_000)
})
