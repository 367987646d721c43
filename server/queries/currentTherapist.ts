import { now } from '../clock.ts'
import type { Fragment } from './sql.ts'

/** Name of the therapist who holds the child of `column` now; null while nobody does. */
export const therapistName = (column: string): Fragment => ({
  sql: `(SELECT tu.displayName FROM assignments ta JOIN users tu ON tu.id = ta.therapistId
    WHERE ta.childId = ${column} AND ta.startedAt <= :therapistNow
      AND (ta.endedAt IS NULL OR ta.endedAt > :therapistNow) ORDER BY ta.startedAt DESC, ta.id LIMIT 1)`,
  parameters: { therapistNow: now() },
})
