import type { TestProject } from 'vitest/node'
import type { AccountRole } from '../../server/setup/mariadbFiles.ts'
import type { DatabaseAccess } from '../../server/setup/databaseAccess.ts'
import { startTestMariaDb } from './mariadb.ts'

declare module 'vitest' {
  interface ProvidedContext {
    mariadb: Record<AccountRole, DatabaseAccess>
  }
}

/** One MariaDB for all server tests of a run; database.ts gives each test file a fresh database in it. */
export default async function serverSetup(project: TestProject) {
  const mariadb = await startTestMariaDb()
  project.provide('mariadb', {
    migrate: mariadb.access('migrate'),
    app: mariadb.access('app'),
    backup: mariadb.access('backup'),
  })
  return mariadb.remove
}
