import session, { type SessionData } from 'express-session'
import { endSession, readSession, writeSession, type SessionContent } from '../services/sessions.ts'

declare module 'express-session' {
  interface SessionData extends SessionContent {
    cookie: session.Cookie
  }
}

type Done<T = void> = (error?: unknown, result?: T) => void

/** Hands express-session's calls to services/sessions.ts. */
export class SessionStore extends session.Store {
  override get(sid: string, done: (error: unknown, data?: SessionData | null) => void): void {
    readSession<SessionData>(sid).then((data) => done(null, data), done)
  }

  override set(sid: string, data: SessionData, done?: Done): void {
    writeSession(sid, data).then(
      () => done?.(),
      (error: unknown) => done?.(error),
    )
  }

  override destroy(sid: string, done?: Done): void {
    endSession(sid).then(
      () => done?.(),
      (error: unknown) => done?.(error),
    )
  }

  // Idle time is counted by `markSeen`, which background requests do not call.
  override touch(_sid: string, _data: SessionData, done?: () => void): void {
    done?.()
  }
}
