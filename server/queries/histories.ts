import type { Day } from '../../shared/days.ts'
import { isId } from '../../shared/fields.ts'
import type { HistoryDetails, HistoryInformant } from '../../shared/histories.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { leftOver } from './answerRequests.ts'
import { within } from './scope.ts'
import { flag, fromJson, selectRows } from './sql.ts'

interface StoredHistory {
  id: string
  childId: string
  informant: HistoryInformant
  respondentName: string | null
  answeredOn: Day
  details: string
  lockedAt: Date | null
  /** The carer's name where one answered at home. */
  lockedBy: string | null
  replacesId: string | null
  replacedById: string | null
  leftOver: number
  version: number
}

export interface HistoryRecord extends Omit<StoredHistory, 'details' | 'leftOver'> {
  details: HistoryDetails
  /** Begun for a request that ended before the answers were sent. */
  leftOver: boolean
}

const select = async (
  access: ChildAccess,
  condition: string,
  parameters: Record<string, string> = {},
  tx?: Tx,
): Promise<HistoryRecord[]> => {
  const scope = within(access, 'h.childId')
  const rows = await selectRows<StoredHistory>(
    `SELECT h.id, h.childId, h.informant, COALESCE(h.respondentName, g.name) AS respondentName, h.answeredOn,
       h.details, h.lockedAt, COALESCE(u.displayName, g.name) AS lockedBy, h.replacesId, n.id AS replacedById,
       ${leftOver('r')} AS leftOver, h.version
     FROM histories h
     LEFT JOIN users u ON u.id = h.lockedById
     LEFT JOIN guardians g ON g.id = h.guardianId
     LEFT JOIN histories n ON n.replacesId = h.id
     LEFT JOIN answer_requests r ON r.id = h.requestId
     WHERE ${scope.sql} AND ${condition} ORDER BY h.answeredOn DESC, h.createdAt DESC, h.id`,
    { ...scope.parameters, ...parameters, requestNow: now() },
    tx,
  )
  return rows.map(({ details, leftOver: over, ...rest }) => ({
    ...rest,
    details: fromJson<HistoryDetails>(details),
    leftOver: flag(over),
  }))
}

/** Every history of a child, newest first. */
export const listHistories = (access: ChildAccess): Promise<HistoryRecord[]> => select(access, '1 = 1')

export const findHistory = async (access: ChildAccess, id: string, tx?: Tx): Promise<HistoryRecord> => {
  if (!isId(id)) throw notFound()
  const [found] = await select(access, 'h.id = :historyId', { historyId: id }, tx)
  if (!found) throw notFound()
  return found
}
