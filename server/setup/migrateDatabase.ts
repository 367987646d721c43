import { createDataSource } from '../dataSource.ts'
import type { DatabaseAccess } from './databaseAccess.ts'
import { accountOf, applyGrants } from './grants.ts'

/** Brings the schema up to date as the owner and gives the app account exactly its rights. Safe to run at every start. */
export const migrateDatabase = async (owner: DatabaseAccess, app: DatabaseAccess): Promise<void> => {
  const dataSource = createDataSource(owner)
  await dataSource.initialize()
  try {
    await dataSource.runMigrations()
    const account = await accountOf(app)
    await applyGrants(dataSource, owner.database, account)
    const [user, host] = account.split('@')
    for (const view of ['guard_names', 'passing_keys'])
      await dataSource.query(`GRANT SELECT ON ${view} TO ?@?`, [user, host])
  } finally {
    await dataSource.destroy()
  }
}
