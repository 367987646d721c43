import type { Day } from '../../shared/days.ts'
import type { EpisodeState } from '../../shared/episodes.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { within } from './scope.ts'
import { selectOne } from './sql.ts'

/** Id of the newest episode of the child in `column`: a re-referral opens a new one. */
export const latestEpisode = (column: string): string =>
  `(SELECT le.id FROM episodes le WHERE le.childId = ${column}
    ORDER BY le.receivedOn DESC, le.createdAt DESC, le.id LIMIT 1)`

export interface EpisodeRow {
  id: string
  state: EpisodeState
  firstSeenOn: Day | null
  version: number
}

/** The child's newest episode; null before the first. Locked inside a transaction. */
export const findEpisode = (access: ChildAccess, tx?: Tx): Promise<EpisodeRow | null> => {
  const scope = within(access, 'e.childId')
  return selectOne<EpisodeRow>(
    `SELECT e.id, e.state, e.firstSeenOn, e.version FROM episodes e
     WHERE e.id = ${latestEpisode('e.childId')} AND ${scope.sql} ${tx ? 'FOR UPDATE' : ''}`,
    scope.parameters,
    tx,
  )
}
