import type { DataSource } from 'typeorm'
import { openDatabase } from '../../server/dataSource.ts'
import { openAuditChain } from '../../server/services/audit.ts'
import { migrateDatabase } from '../../server/setup/migrateDatabase.ts'
import { createEmptyDatabase } from './database.ts'

/** A fresh migrated database with its grants, opened as the app account. Call in beforeAll; close in afterAll. */
export const openClinicDatabase = async (): Promise<DataSource> => {
  const access = await createEmptyDatabase()
  await migrateDatabase(access.migrate, access.app)
  const dataSource = await openDatabase(access.app)
  await openAuditChain('test')
  return dataSource
}
