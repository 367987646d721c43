import { randomUUID } from 'node:crypto'
import { closedStates, type EpisodeState } from '../../shared/episodes.ts'
import type { Day } from '../../shared/days.ts'
import type { Priority } from '../../shared/referrals.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Episode } from '../entities/Episode.ts'
import { EpisodeChange } from '../entities/EpisodeChange.ts'
import { selectOne } from '../queries/sql.ts'

export interface NewEpisode {
  childId: string
  referralId: string
  receivedOn: Day
  priority: Priority
  /** The states it passes at once; it stays in the last one. */
  path: readonly [EpisodeState, ...EpisodeState[]]
  reason: string
  byId: string
}

/** Opens an episode of care and keeps each state it passed. */
export const openEpisode = async (
  tx: Tx,
  { childId, referralId, receivedOn, priority, path, reason, byId }: NewEpisode,
): Promise<string> => {
  const id = randomUUID()
  await tx.insert(Episode, {
    id,
    childId,
    referralId,
    state: path.at(-1),
    receivedOn,
    priority,
    firstSeenOn: null,
    closedOn: null,
    createdAt: now(),
  })
  for (const [index, state] of path.entries())
    await tx.insert(EpisodeChange, {
      id: randomUUID(),
      episodeId: id,
      fromState: path[index - 1] ?? null,
      toState: state,
      reason,
      byId,
      // Changes of one moment keep their order.
      at: new Date(now().getTime() + index),
    })
  return id
}

/** The child's open episode, locked; null when none is. */
export const lockOpenEpisode = (
  tx: Tx,
  childId: string,
): Promise<Pick<Episode, 'id' | 'state' | 'version'> | null> =>
  selectOne(
    `SELECT e.id, e.state, e.version FROM episodes e WHERE e.childId = :childId AND e.state NOT IN (:closed)
     ORDER BY e.receivedOn DESC, e.createdAt DESC, e.id LIMIT 1 FOR UPDATE`,
    { childId, closed: closedStates },
    tx,
  )
