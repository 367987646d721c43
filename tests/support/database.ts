import { createConnection } from 'mysql2/promise'
import { inject } from 'vitest'
import { connectionOptions, type DatabaseAccess } from '../../server/setup/databaseAccess.ts'
import type { AccountRole } from '../../server/setup/mariadbFiles.ts'

/** One worker runs one test file at a time, so a database a worker is enough. */
export const testDatabaseName = () => `test_w${process.env.VITEST_POOL_ID ?? '0'}`

/** How each of the three accounts reaches this worker's database. */
export function testDatabaseAccess(): Record<AccountRole, DatabaseAccess> {
  const accounts = inject('mariadb')
  const database = testDatabaseName()
  return {
    migrate: { ...accounts.migrate, database },
    app: { ...accounts.app, database },
    backup: { ...accounts.backup, database },
  }
}

/** Drops and makes this worker's database anew, without any table. Call it once at the top of a test file. */
export async function createEmptyDatabase(): Promise<Record<AccountRole, DatabaseAccess>> {
  const access = testDatabaseAccess()
  const { database, ...server } = connectionOptions(access.migrate)
  const owner = await createConnection(server)
  try {
    await owner.query(`DROP DATABASE IF EXISTS \`${database}\``)
    await owner.query(`CREATE DATABASE \`${database}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`)
  } finally {
    await owner.end()
  }
  return access
}
