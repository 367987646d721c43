import { closedStates } from '../../shared/episodes.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { runsAt } from './inForce.ts'
import { count, flag, selectOne, selectRows } from './sql.ts'

export interface TherapistRow {
  id: string
  displayName: string
  openCases: number
}

/** Active therapists by name, with the number of children they hold whose episode is open. */
export const listTherapists = async (): Promise<TherapistRow[]> => {
  const rows = await selectRows<{ id: string; displayName: string; openCases: string }>(
    `SELECT u.id, u.displayName,
       (SELECT COUNT(DISTINCT a.childId) FROM assignments a JOIN episodes e ON e.childId = a.childId
         WHERE a.therapistId = u.id AND ${runsAt('a')}
           AND e.state NOT IN (:closed)) AS openCases
     FROM users u WHERE u.disabledAt IS NULL AND JSON_CONTAINS(u.roles, '"therapist"')
     ORDER BY u.displayName, u.id`,
    { now: now(), closed: closedStates },
  )
  return rows.map((row) => ({ ...row, openCases: count(row.openCases) }))
}

/** Whether this account may hold cases now. */
export const isActiveTherapist = async (tx: Tx, userId: string): Promise<boolean> => {
  const row = await selectOne<{ active: number }>(
    `SELECT EXISTS (SELECT 1 FROM users u WHERE u.id = :userId AND u.disabledAt IS NULL
       AND JSON_CONTAINS(u.roles, '"therapist"')) AS active`,
    { userId },
    tx,
  )
  return row !== null && flag(row.active)
}
