import type { AlertOrigin } from '../../shared/alerts.ts'
import type { Attention } from '../../shared/attention.ts'
import { redFlagUrgencies, type RedFlagUrgency } from '../../shared/redFlagRows.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { selectPage, type PageOf, type PageSlice } from './pages.ts'
import { within } from './scope.ts'
import { count, flag, selectOne, selectRows } from './sql.ts'

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

const columns = `a.id, a.flag, a.text, a.level, a.urgency, a.advice, a.holdsBooking, a.origin, a.originId, a.raisedAt,
  r.displayName AS raisedBy, a.actedAt, b.displayName AS actedBy, a.action`
const from = `FROM alerts a LEFT JOIN users r ON r.id = a.raisedById LEFT JOIN users b ON b.id = a.actedById`

type StoredAlert = Omit<AlertRecord, 'holdsBooking'> & { holdsBooking: number }
const toAlert = (row: StoredAlert): AlertRecord => ({ ...row, holdsBooking: flag(row.holdsBooking) })

const select = async (
  access: ChildAccess,
  condition: string,
  parameters: Record<string, string> = {},
  tx?: Tx,
): Promise<AlertRecord[]> => {
  const scope = within(access, 'a.childId')
  const rows = await selectRows<StoredAlert>(
    `SELECT ${columns} ${from}
     WHERE ${scope.sql} AND ${condition} ORDER BY a.raisedAt DESC, a.id`,
    { ...scope.parameters, ...parameters },
    tx,
  )
  return rows.map(toAlert)
}

/**
 * Warning signs of a child: what waits for somebody first, the most urgent of it leading, then what was answered, the
 * newest first. `open` counts those of the whole record that wait.
 */
export const listAlerts = async (
  access: ChildAccess,
  slice: PageSlice,
): Promise<PageOf<AlertRecord> & { open: number }> => {
  const scope = within(access, 'a.childId')
  const [page, counted] = await Promise.all([
    selectPage<StoredAlert>(
      {
        select: columns,
        from: `${from} WHERE ${scope.sql}`,
        orderBy: `a.actedAt IS NOT NULL, IF(a.actedAt IS NULL, FIELD(a.urgency, :urgencies), 0), a.raisedAt DESC, a.id`,
        parameters: { ...scope.parameters, urgencies: redFlagUrgencies },
      },
      slice,
    ),
    selectOne<{ open: string }>(
      `SELECT COUNT(*) AS open FROM alerts a WHERE ${scope.sql} AND a.actedAt IS NULL`,
      scope.parameters,
    ),
  ])
  return { rows: page.rows.map(toAlert), total: page.total, open: counted ? count(counted.open) : 0 }
}

export const findAlert = async (access: ChildAccess, id: string): Promise<AlertRecord> => {
  const [found] = await select(access, 'a.id = :alertId', { alertId: id })
  if (!found) throw notFound()
  return found
}

/** Signs nobody has acted on that hold a routine block back, oldest first. */
export const listBookingHolds = async (access: ChildAccess, tx?: Tx): Promise<AlertRecord[]> =>
  (await select(access, 'a.holdsBooking = 1 AND a.actedAt IS NULL', {}, tx)).toReversed()
