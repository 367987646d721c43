import { createHash } from 'node:crypto'
import { now } from '../clock.ts'
import { database, type Tx } from '../dataSource.ts'
import { slowDown } from '../errors.ts'

const freeFailures = 5
const mostFailures = 100
const longestDelaySeconds = 15 * 60

const keyHash = (key: string) => createHash('sha256').update(key).digest()

interface ThrottleRow {
  failures: number
  windowStartedAt: Date
  blockedUntil: Date | null
}

/** Where it is counted: by itself, or in the transaction that also holds what is guessed at. */
type Via = Pick<Tx, 'query'>

const read = async (key: string, via: Via = database()): Promise<ThrottleRow | null> => {
  const [row] = (await via.query(
    'SELECT failures, windowStartedAt, blockedUntil FROM throttles WHERE keyHash = ?',
    [keyHash(key)],
  )) as ThrottleRow[]
  return row ?? null
}

const secondsUntil = (moment: Date) => Math.max(1, Math.ceil((moment.getTime() - now().getTime()) / 1000))

/** Delay after the n-th failure in a row: none up to 5, then 1 s doubling to 15 min. */
export const delaySeconds = (failures: number): number =>
  failures <= freeFailures ? 0 : Math.min(2 ** (failures - freeFailures - 1), longestDelaySeconds)

/** Throws 429 while attempts are held back. */
export const refuseWhileBlocked = async (key: string, via: Via = database()): Promise<void> => {
  const row = await read(key, via)
  if (row && row.failures >= mostFailures) throw slowDown(longestDelaySeconds)
  if (row?.blockedUntil && row.blockedUntil > now()) throw slowDown(secondsUntil(row.blockedUntil))
}

/**
 * Counts one attempt before it is judged, so that parallel guesses cannot slip through between look and count.
 * Throws 429 while blocked; after 100 failures in a row only a reset by mail helps. Shared by all processes.
 */
export const countAttempt = async (key: string, via: Via = database()): Promise<void> => {
  await refuseWhileBlocked(key, via)
  await via.query(
    `INSERT INTO throttles (keyHash, failures, windowStartedAt, blockedUntil) VALUES (?, 1, ?, NULL)
     ON DUPLICATE KEY UPDATE failures = failures + 1`,
    [keyHash(key), now()],
  )
  const counted = await read(key, via)
  const delay = delaySeconds(counted?.failures ?? 1)
  if (delay > 0)
    await via.query('UPDATE throttles SET blockedUntil = ? WHERE keyHash = ?', [
      new Date(now().getTime() + delay * 1000),
      keyHash(key),
    ])
}

export const clearAttempts = async (key: string): Promise<void> => {
  await database().query('UPDATE throttles SET failures = 0, blockedUntil = NULL WHERE keyHash = ?', [
    keyHash(key),
  ])
}

/** At most `limit` hits in a window of so many seconds; the next one throws 429 with the time left. */
export const countHit = async (key: string, limit: number, windowSeconds: number): Promise<void> => {
  const at = now()
  const windowStart = new Date(at.getTime() - windowSeconds * 1000)
  await database().query(
    `INSERT INTO throttles (keyHash, failures, windowStartedAt) VALUES (?, 1, ?)
     ON DUPLICATE KEY UPDATE failures = IF(windowStartedAt <= ?, 1, failures + 1),
       windowStartedAt = IF(windowStartedAt <= ?, ?, windowStartedAt)`,
    [keyHash(key), at, windowStart, windowStart, at],
  )
  const row = await read(key)
  if (row && row.failures > limit)
    throw slowDown(secondsUntil(new Date(row.windowStartedAt.getTime() + windowSeconds * 1000)))
}

/** Takes one hit back: what was counted in advance turned out not to be a failure. */
export const forgiveHit = async (key: string): Promise<void> => {
  await database().query('UPDATE throttles SET failures = GREATEST(failures, 1) - 1 WHERE keyHash = ?', [
    keyHash(key),
  ])
}
