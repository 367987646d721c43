import type { Day } from '../../shared/days.ts'
import { isId } from '../../shared/fields.ts'
import type { MeasureDetails, MeasureKind, MeasureScore } from '../../shared/measures.ts'
import { scoreMeasure } from '../../shared/measureScores.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { within } from './scope.ts'
import { flag, fromJson, selectOne, selectRows } from './sql.ts'

interface StoredMeasure {
  id: string
  childId: string
  kind: MeasureKind
  methodVersion: string
  measuredOn: Day
  details: string
  score: string | null
  notDoneReason: string | null
  comment: string | null
  startedBy: string
  lockedAt: Date | null
  lockedBy: string | null
  replacesId: string | null
  replacedById: string | null
  superseded: number
  version: number
}

export interface MeasureRecord extends Omit<StoredMeasure, 'details' | 'score' | 'superseded'> {
  details: MeasureDetails
  /** As stored when locked; until then computed from the trials at hand. */
  score: MeasureScore
  /** A locked newer version took its place. */
  superseded: boolean
}

const toRecord = ({ details, score, superseded, ...rest }: StoredMeasure): MeasureRecord => {
  const taken = fromJson<MeasureDetails>(details)
  return {
    ...rest,
    details: taken,
    score: score === null ? scoreMeasure(taken) : fromJson<MeasureScore>(score),
    superseded: flag(superseded),
  }
}

const selectMeasures = async (
  access: ChildAccess,
  condition: string,
  parameters: Record<string, string> = {},
  tx?: Tx,
): Promise<MeasureRecord[]> => {
  const scope = within(access, 'm.childId')
  const rows = await selectRows<StoredMeasure>(
    `SELECT m.id, m.childId, m.kind, m.methodVersion, m.measuredOn, m.details, m.score, m.notDoneReason, m.comment,
       s.displayName AS startedBy, m.lockedAt, u.displayName AS lockedBy, m.replacesId, n.id AS replacedById,
       (n.lockedAt IS NOT NULL) AS superseded, m.version
     FROM measures m
     JOIN users s ON s.id = m.startedById
     LEFT JOIN users u ON u.id = m.lockedById
     LEFT JOIN measures n ON n.replacesId = m.id
     WHERE ${scope.sql} AND ${condition} ORDER BY m.measuredOn DESC, m.createdAt DESC, m.id`,
    { ...scope.parameters, ...parameters },
    tx,
  )
  return rows.map(toRecord)
}

/** Every measure of a child in one query, the newest occasion first; drafts and superseded ones too. */
export const listMeasures = (access: ChildAccess): Promise<MeasureRecord[]> => selectMeasures(access, '1 = 1')

export const findMeasure = async (access: ChildAccess, id: string, tx?: Tx): Promise<MeasureRecord> => {
  if (!isId(id)) throw notFound()
  const [found] = await selectMeasures(access, 'm.id = :measureId', { measureId: id }, tx)
  if (!found) throw notFound()
  return found
}

/** Who began a measure of this kind for this day that is still open; null when nobody did. */
export const openMeasureOf = async (
  access: ChildAccess,
  kind: MeasureKind,
  measuredOn: Day,
  tx: Tx,
): Promise<{ id: string; startedBy: string } | null> => {
  const scope = within(access, 'm.childId')
  // A locking read: the newest rows count, not those this transaction saw first.
  return selectOne(
    `SELECT m.id, (SELECT s.displayName FROM users s WHERE s.id = m.startedById) AS startedBy FROM measures m
     WHERE ${scope.sql} AND m.kind = :kind AND m.measuredOn = :measuredOn AND m.lockedAt IS NULL
     ORDER BY m.createdAt LIMIT 1 FOR UPDATE`,
    { ...scope.parameters, kind, measuredOn },
    tx,
  )
}
