import type { Tx } from '../dataSource.ts'
import { execute, selectOne } from '../queries/sql.ts'

/**
 * The next record number of a year, FF-2026-0041. The year's row stays locked until the transaction ends, so two
 * records never share a number and a record that was not made leaves no gap.
 */
export const nextRecordNumber = async (tx: Tx, year: number): Promise<string> => {
  await execute(
    tx,
    `INSERT INTO record_numbers (year, lastNumber) VALUES (:year, 1)
     ON DUPLICATE KEY UPDATE lastNumber = lastNumber + 1`,
    { year },
  )
  const row = await selectOne<{ lastNumber: number }>(
    'SELECT lastNumber FROM record_numbers WHERE year = :year FOR UPDATE',
    { year },
    tx,
  )
  if (!row) throw new Error('The record number was not kept')
  return `FF-${year}-${String(row.lastNumber).padStart(4, '0')}`
}
