import { closedStates, type EpisodeState } from '../../shared/episodes.ts'
import type { Day } from '../../shared/days.ts'
import { waitingStates } from '../../shared/waits.ts'
import type { Viewer } from '../access/actor.ts'
import { now } from '../clock.ts'
import { therapistId } from './currentTherapist.ts'
import { latestEpisode } from './episodes.ts'
import { runsAt } from './inForce.ts'
import { recordName } from './names.ts'
import { flag, selectRows } from './sql.ts'
import { staffScope } from './staffScope.ts'

export interface WaitingRow {
  childId: string
  name: string
  receivedOn: Day
  priority: boolean
}

/** Enough for the ribbon of one clinic; the list behind it pages through all. */
const mostBars = 200

/** Children whose assessment has not begun, the longest wait first. */
export const listWaiting = async (viewer: Viewer): Promise<WaitingRow[]> => {
  const scope = staffScope(viewer, 'c.id', ['clinicLead'])
  const rows = await selectRows<Omit<WaitingRow, 'priority'> & { priority: number }>(
    `SELECT c.id AS childId, ${recordName('c')} AS name, e.receivedOn, e.priority = 'priority' AS priority
     FROM children c JOIN episodes e ON e.id = ${latestEpisode('c.id')}
     WHERE e.state IN (:waiting) AND ${scope.sql} ORDER BY e.receivedOn, c.id LIMIT :most`,
    { ...scope.parameters, waiting: waitingStates, most: mostBars },
  )
  return rows.map((row) => ({ ...row, priority: flag(row.priority) }))
}

export interface OpenCaseRow {
  therapistId: string | null
  state: EpisodeState
  nextReviewOn: Day | null
  interpreter: boolean
  twoHouseholds: boolean
  safeguarding: boolean
}

type Flags = 'interpreter' | 'twoHouseholds' | 'safeguarding'

/** Every open child with who holds it and what makes it more work: the points are counted by a rule, not here. */
export const listOpenCases = async (viewer: Viewer): Promise<OpenCaseRow[]> => {
  const scope = staffScope(viewer, 'c.id', ['clinicLead'])
  const therapist = therapistId('c.id')
  const rows = await selectRows<Omit<OpenCaseRow, Flags> & Record<Flags, number>>(
    `SELECT e.state, c.nextReviewOn, c.interpreterLanguage IS NOT NULL AS interpreter,
       (SELECT COUNT(DISTINCT h.address) FROM guardians h WHERE h.childId = c.id AND h.endedAt IS NULL) > 1 AS twoHouseholds,
       EXISTS (SELECT 1 FROM guardians r WHERE r.childId = c.id AND r.endedAt IS NULL
         AND (r.courtOrder = 1 OR r.restricted = 1)) AS safeguarding,
       ${therapist.sql} AS therapistId
     FROM children c JOIN episodes e ON e.id = ${latestEpisode('c.id')}
     WHERE e.state NOT IN (:closed) AND ${scope.sql}`,
    { ...scope.parameters, ...therapist.parameters, closed: closedStates },
  )
  return rows.map((row) => ({
    ...row,
    interpreter: flag(row.interpreter),
    twoHouseholds: flag(row.twoHouseholds),
    safeguarding: flag(row.safeguarding),
  }))
}

export interface LoadedTherapistRow {
  id: string
  displayName: string
  wte: number | null
}

/** Therapists who work here, and whoever still holds a child although they do not. */
export const listLoadedTherapists = async (): Promise<LoadedTherapistRow[]> => {
  const rows = await selectRows<Omit<LoadedTherapistRow, 'wte'> & { wte: string | null }>(
    `SELECT u.id, u.displayName, u.wte FROM users u
     WHERE (u.disabledAt IS NULL AND JSON_CONTAINS(u.roles, '"therapist"'))
       OR EXISTS (SELECT 1 FROM assignments a WHERE a.therapistId = u.id AND ${runsAt('a')})
     ORDER BY u.displayName, u.id`,
    { now: now() },
  )
  return rows.map((row) => ({ ...row, wte: row.wte === null ? null : Number(row.wte) }))
}
