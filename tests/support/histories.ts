import { randomUUID } from 'node:crypto'
import { emptyHistory, type HistoryDetails } from '../../shared/histories.ts'
import { now } from '../../server/clock.ts'
import type { Child } from '../../server/entities/Child.ts'
import { History } from '../../server/entities/History.ts'
import type { User } from '../../server/entities/User.ts'
import { insertRow } from './insertRow.ts'
import { seenOn } from './records.ts'

/** Answers of a history; whatever is not given is not answered. */
export const historyDetails = (given: Partial<HistoryDetails> = {}): HistoryDetails => ({
  ...emptyHistory,
  ...given,
})

interface Given extends Partial<Omit<History, 'details'>> {
  locked: boolean
  details?: Partial<HistoryDetails>
}

/** A history that a therapist wrote down. */
export const buildHistory = (
  child: Pick<Child, 'id'>,
  by: Pick<User, 'id'>,
  { locked, details, ...given }: Given,
): Promise<History> =>
  insertRow(History, {
    id: randomUUID(),
    childId: child.id,
    informant: 'therapist',
    respondentName: 'Mother',
    answeredOn: seenOn(),
    details: historyDetails(details),
    requestId: null,
    guardianId: null,
    startedById: by.id,
    lockedAt: locked ? now() : null,
    lockedById: locked ? by.id : null,
    replacesId: null,
    createdAt: now(),
    ...given,
  })
