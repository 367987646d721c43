import { laterObserved, type WritingObservationDetails } from '../../shared/writingObservations.ts'
import { isId } from '../../shared/fields.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { within } from './scope.ts'
import { fromJson, selectRows } from './sql.ts'

interface StoredObservation {
  id: string
  details: string
  observedBy: string
  recordedAt: Date
}

export interface ObservationRecord extends Omit<StoredObservation, 'details'> {
  details: WritingObservationDetails
}

const selectObservations = async (
  access: ChildAccess,
  condition: string,
  parameters: Record<string, string> = {},
  tx?: Tx,
): Promise<ObservationRecord[]> => {
  const scope = within(access, 'o.childId')
  const rows = await selectRows<StoredObservation>(
    `SELECT o.id, o.details, u.displayName AS observedBy, o.recordedAt
     FROM writing_observations o JOIN users u ON u.id = o.observedById
     WHERE ${scope.sql} AND ${condition} ORDER BY o.observedOn DESC, o.recordedAt DESC, o.id`,
    { ...scope.parameters, ...parameters },
    tx,
  )
  return rows.map((row) => ({
    ...row,
    details: { ...laterObserved, ...fromJson<WritingObservationDetails>(row.details) },
  }))
}

/** Observations of a child's writing, the newest first. */
export const listObservations = (access: ChildAccess): Promise<ObservationRecord[]> =>
  selectObservations(access, '1 = 1')

export const findObservation = async (access: ChildAccess, id: string): Promise<ObservationRecord> => {
  if (!isId(id)) throw notFound()
  const [found] = await selectObservations(access, 'o.id = :observationId', { observationId: id })
  if (!found) throw notFound()
  return found
}

/** What was seen last before this observation was kept; null when it is the first. */
export const findObservationBefore = async (
  access: ChildAccess,
  id: string,
  tx: Tx,
): Promise<ObservationRecord | null> => {
  const [earlier] = await selectObservations(access, 'o.id <> :observationId', { observationId: id }, tx)
  return earlier ?? null
}
