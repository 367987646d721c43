import type { AlertOrigin } from '../../shared/alerts.ts'
import type { Attention } from '../../shared/attention.ts'
import type { RedFlagUrgency } from '../../shared/redFlagRows.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { within } from './scope.ts'
import { flag, selectRows } from './sql.ts'

export interface AlertRecord {
  id: string
  flag: string
  text: string
  level: Attention
  urgency: RedFlagUrgency
  advice: string | null
  holdsBooking: boolean
  origin: AlertOrigin
  originId: string | null
  raisedAt: Date
  raisedBy: string | null
  actedAt: Date | null
  actedBy: string | null
  action: string | null
}

const select = async (
  access: ChildAccess,
  condition: string,
  parameters: Record<string, string> = {},
  tx?: Tx,
): Promise<AlertRecord[]> => {
  const scope = within(access, 'a.childId')
  const rows = await selectRows<Omit<AlertRecord, 'holdsBooking'> & { holdsBooking: number }>(
    `SELECT a.id, a.flag, a.text, a.level, a.urgency, a.advice, a.holdsBooking, a.origin, a.originId, a.raisedAt,
       r.displayName AS raisedBy, a.actedAt, b.displayName AS actedBy, a.action
     FROM alerts a LEFT JOIN users r ON r.id = a.raisedById LEFT JOIN users b ON b.id = a.actedById
     WHERE ${scope.sql} AND ${condition} ORDER BY a.raisedAt DESC, a.id`,
    { ...scope.parameters, ...parameters },
    tx,
  )
  return rows.map((row) => ({ ...row, holdsBooking: flag(row.holdsBooking) }))
}

/** Every warning sign of a child with what was done about it, newest first. */
export const listAlerts = (access: ChildAccess): Promise<AlertRecord[]> => select(access, '1 = 1')

export const findAlert = async (access: ChildAccess, id: string): Promise<AlertRecord> => {
  const [found] = await select(access, 'a.id = :alertId', { alertId: id })
  if (!found) throw notFound()
  return found
}

/** Signs nobody has acted on that hold a routine block back, oldest first. */
export const listBookingHolds = async (access: ChildAccess, tx?: Tx): Promise<AlertRecord[]> =>
  (await select(access, 'a.holdsBooking = 1 AND a.actedAt IS NULL', {}, tx)).toReversed()
