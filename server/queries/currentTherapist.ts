import { now } from '../clock.ts'
import { runsAt } from './inForce.ts'
import type { Fragment } from './sql.ts'

const ofTherapist = (selected: string, column: string): Fragment => ({
  sql: `(SELECT ${selected} FROM assignments ta JOIN users tu ON tu.id = ta.therapistId
    WHERE ta.childId = ${column} AND ${runsAt('ta', ':therapistNow')}
    ORDER BY ta.startedAt DESC, ta.id LIMIT 1)`,
  parameters: { therapistNow: now() },
})

/** Name of the therapist who holds the child of `column` now; null while nobody does. */
export const therapistName = (column: string): Fragment => ofTherapist('tu.displayName', column)

/** Id of the therapist who holds the child of `column` now; null while nobody does. */
export const therapistId = (column: string): Fragment => ofTherapist('tu.id', column)
