import { createConnection, type RowDataPacket } from 'mysql2/promise'
import { connectionOptions, type DatabaseAccess } from './databaseAccess.ts'

/** Actions in the audit trail that mark where the making of the demo stands. */
export const demoBegun = 'demo.begun'
export const demoMade = 'demo.made'

/**
 * A first start that was killed while the demo was being made leaves half a clinic. Its private database holds nothing
 * else, so it is emptied and made anew. Call it before the migrations; answers whether it did.
 */
export const clearHalfMadeDemo = async (owner: DatabaseAccess): Promise<boolean> => {
  const connection = await createConnection(connectionOptions(owner))
  try {
    const [tables] = await connection.query<RowDataPacket[]>("SHOW TABLES LIKE 'audit_entries'")
    if (tables.length === 0) return false
    const [marks] = await connection.query<RowDataPacket[]>(
      'SELECT DISTINCT action FROM audit_entries WHERE action IN (?, ?)',
      [demoBegun, demoMade],
    )
    const seen = marks.map((row) => row.action as string)
    if (!seen.includes(demoBegun) || seen.includes(demoMade)) return false
    await connection.query(`DROP DATABASE \`${owner.database}\``)
    await connection.query(
      `CREATE DATABASE \`${owner.database}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`,
    )
    return true
  } finally {
    await connection.end()
  }
}
