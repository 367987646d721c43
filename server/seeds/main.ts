import { closeDatabase, openDatabase } from '../dataSource.ts'
import { openAuditChain } from '../services/audit.ts'
import type { DatabaseAccess } from '../setup/databaseAccess.ts'
import { seedClinic } from './seedClinic.ts'

/*
 * Makes the demo clinic in a process of its own, so that what it needs in memory is given back before the server
 * serves. Told by its parent which database; answers once, then ends.
 */
export interface SeedOrder {
  access: DatabaseAccess
  chain: string
  appUrl: string
}

process.once('message', (order: SeedOrder) => {
  const seed = async () => {
    await openDatabase(order.access)
    await openAuditChain(order.chain)
    await seedClinic(order.appUrl)
    await closeDatabase()
  }
  seed().then(
    () => process.send?.({ done: true }, () => process.exit(0)),
    (error: unknown) => {
      console.error(error)
      process.exit(1)
    },
  )
})
