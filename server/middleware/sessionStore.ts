import { createHash } from 'node:crypto'
import session, { type SessionData } from 'express-session'
import { now } from '../clock.ts'
import { database } from '../dataSource.ts'

declare module 'express-session' {
  interface SessionData {
    passport?: { user: string }
    sharedComputer?: boolean
  }
}

export const absoluteHours = 12
const idleMinutes = 30
const idleMinutesShared = 15

export const idleSecondsOf = (data: Pick<SessionData, 'sharedComputer'>) =>
  60 * (data.sharedComputer ? idleMinutesShared : idleMinutes)

export const sessionHash = (sid: string) => createHash('sha256').update(sid).digest()

interface SessionRow {
  data: string
  lastSeenAt: Date
  expiresAt: Date
  endedAt: Date | null
}

/**
 * Sessions in MariaDB. Only a hash of the id is stored. A session ends by idleness, by age, or by a tombstone
 * (`endedAt`) that no request still in flight can write over: `set` changes living rows only.
 */
export class SessionStore extends session.Store {
  override get(sid: string, done: (error: unknown, data?: SessionData | null) => void): void {
    this.read(sid).then((data) => done(null, data), done)
  }

  override set(sid: string, data: SessionData, done?: (error?: unknown) => void): void {
    this.write(sid, data).then(() => done?.(), done)
  }

  override destroy(sid: string, done?: (error?: unknown) => void): void {
    database()
      .query('UPDATE user_sessions SET endedAt = ?, data = ? WHERE idHash = ? AND endedAt IS NULL', [
        now(),
        '{}',
        sessionHash(sid),
      ])
      .then(() => done?.(), done)
  }

  // Idle time is counted by `markSeen`, which background requests do not call.
  override touch(_sid: string, _data: SessionData, done?: () => void): void {
    done?.()
  }

  private async read(sid: string): Promise<SessionData | null> {
    const [row] = (await database().query(
      'SELECT data, lastSeenAt, expiresAt, endedAt FROM user_sessions WHERE idHash = ?',
      [sessionHash(sid)],
    )) as SessionRow[]
    if (!row || row.endedAt) return null
    const data = JSON.parse(row.data) as SessionData
    const idleFor = (now().getTime() - row.lastSeenAt.getTime()) / 1000
    return now() >= row.expiresAt || idleFor > idleSecondsOf(data) ? null : data
  }

  private async write(sid: string, data: SessionData): Promise<void> {
    const idHash = sessionHash(sid)
    const userId = data.passport?.user ?? null
    const updated = (await database().query(
      'UPDATE user_sessions SET data = ?, userId = ? WHERE idHash = ? AND endedAt IS NULL',
      [JSON.stringify(data), userId, idHash],
    )) as { affectedRows: number }
    if (updated.affectedRows > 0) return
    // Never seen: a new sign-in. A tombstone makes the INSERT a no-op.
    await database().query(
      'INSERT IGNORE INTO user_sessions (idHash, data, userId, createdAt, lastSeenAt, expiresAt) VALUES (?, ?, ?, ?, ?, ?)',
      [
        idHash,
        JSON.stringify(data),
        userId,
        now(),
        now(),
        new Date(now().getTime() + absoluteHours * 3_600_000),
      ],
    )
  }
}

/** A person did something: the idle time starts again. Written at most every ten seconds. */
export const markSeen = (sid: string): Promise<unknown> =>
  database().query(
    'UPDATE user_sessions SET lastSeenAt = ? WHERE idHash = ? AND endedAt IS NULL AND lastSeenAt < ?',
    [now(), sessionHash(sid), new Date(now().getTime() - 10_000)],
  )
