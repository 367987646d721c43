import { createHash } from 'node:crypto'
import { now } from '../clock.ts'
import { database, type Tx } from '../dataSource.ts'
import { execute } from '../queries/sql.ts'

const absoluteHours = 12
const idleMinutes = 30
const idleMinutesShared = 15
/** How exactly activity is written down. */
const seenSeconds = 10

/** What a sign-in carries. The cookie part belongs to the session middleware and is passed through. */
export interface SessionContent {
  passport?: { user: string }
  sharedComputer?: boolean
  /** When activity was last written down, in ms; handed on by `readSession`, never kept in the content. */
  lastSeenAt?: number
}

/** Seconds without activity after which a sign-in ends: 30 minutes, 15 on a shared computer. */
export const idleSecondsOf = (content: SessionContent): number =>
  60 * (content.sharedComputer ? idleMinutesShared : idleMinutes)

export const sessionHash = (sid: string): Buffer => createHash('sha256').update(sid).digest()

interface SessionRow {
  data: string
  lastSeenAt: Date
  expiresAt: Date
  endedAt: Date | null
}

/** The content of a living session; null when it is unknown, signed out, idle too long or older than 12 hours. */
export const readSession = async <T extends SessionContent>(sid: string): Promise<T | null> => {
  const [row] = (await database().query(
    'SELECT data, lastSeenAt, expiresAt, endedAt FROM user_sessions WHERE idHash = ?',
    [sessionHash(sid)],
  )) as SessionRow[]
  if (!row || row.endedAt) return null
  const content = JSON.parse(row.data) as T
  const idleSeconds = (now().getTime() - row.lastSeenAt.getTime()) / 1000
  return now() >= row.expiresAt || idleSeconds > idleSecondsOf(content)
    ? null
    : { ...content, lastSeenAt: row.lastSeenAt.getTime() }
}

/**
 * Writes a living session, or begins one that was never seen. A session that was ended keeps its tombstone: a request
 * still in flight at sign-out cannot bring it back.
 */
export const writeSession = async (sid: string, content: SessionContent): Promise<void> => {
  const idHash = sessionHash(sid)
  const userId = content.passport?.user ?? null
  const data = JSON.stringify({ ...content, lastSeenAt: undefined })
  const updated = (await database().query(
    'UPDATE user_sessions SET data = ?, userId = ? WHERE idHash = ? AND endedAt IS NULL',
    [data, userId, idHash],
  )) as { affectedRows: number }
  if (updated.affectedRows > 0) return
  await database().query(
    `INSERT IGNORE INTO user_sessions (idHash, data, userId, createdAt, lastSeenAt, expiresAt)
     VALUES (?, ?, ?, ?, ?, ?)`,
    [idHash, data, userId, now(), now(), new Date(now().getTime() + absoluteHours * 3_600_000)],
  )
}

export const endSession = async (sid: string): Promise<void> => {
  await database().query(
    "UPDATE user_sessions SET endedAt = ?, data = '{}' WHERE idHash = ? AND endedAt IS NULL",
    [now(), sessionHash(sid)],
  )
}

/** Ends every sign-in of a person with their next request; `keep` is the hash of the one that goes on. */
export const endSessionsOf = async (tx: Tx, userId: string, keep: Buffer | null = null): Promise<void> => {
  await execute(
    tx,
    `UPDATE user_sessions SET endedAt = :now
     WHERE userId = :userId AND endedAt IS NULL AND (:keep IS NULL OR idHash <> :keep)`,
    { now: now(), userId, keep },
  )
}

/**
 * A person did something: the idle time starts again. Written at most every ten seconds; asks nothing of the database
 * when `lastSeenAt`, as read with the session, is younger than that.
 */
export const markSeen = async (sid: string, lastSeenAt?: number): Promise<void> => {
  if (lastSeenAt !== undefined && now().getTime() - lastSeenAt < seenSeconds * 1000) return
  await database().query(
    'UPDATE user_sessions SET lastSeenAt = ? WHERE idHash = ? AND endedAt IS NULL AND lastSeenAt < ?',
    [now(), sessionHash(sid), new Date(now().getTime() - seenSeconds * 1000)],
  )
}
