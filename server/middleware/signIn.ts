import type { RequestHandler, Request } from 'express'
import session from 'express-session'
import { Passport } from 'passport'
import { Strategy } from 'passport-local'
import type { User } from '../entities/User.ts'
import { checkSignIn, findViewer, newToken } from '../services/accounts.ts'
import { markSeen } from '../services/sessions.ts'
import { SessionStore } from './sessionStore.ts'

export interface SignInSettings {
  /** True when the configured address is https: the cookies are then Secure and carry the __Host- prefix. */
  secure: boolean
  sessionSecret: string
}

const cookieName = (secure: boolean, name: string) => (secure ? `__Host-${name}` : name)
const deviceCookie = 'fanflower-device'
const deviceDays = 365

export const sessionCookieName = (secure: boolean) => cookieName(secure, 'fanflower')

const cookieValue = (req: Request, name: string): string | null => {
  const pair = (req.headers.cookie ?? '').split(/;\s*/).find((part) => part.startsWith(`${name}=`))
  const value = pair?.slice(name.length + 1) ?? ''
  return /^[A-Za-z0-9_-]{43}$/.test(value) ? value : null
}

/** The middleware of signing in: the session, passport, and the viewer of each request. One set for each app. */
export const createSignIn = ({ secure, sessionSecret }: SignInSettings) => {
  const passport = new Passport()
  passport.use(
    new Strategy(
      { usernameField: 'email', passwordField: 'password', passReqToCallback: true },
      (req, email, password, done) => {
        checkSignIn({
          email,
          password,
          address: req.ip ?? 'unknown',
          device: cookieValue(req, cookieName(secure, deviceCookie)),
          requestId: req.actor.requestId,
        }).then(
          (user) => done(null, user ?? false),
          (error: unknown) => done(error),
        )
      },
    ),
  )
  passport.serializeUser((user, done) => done(null, (user as User).id))
  passport.deserializeUser((id, done) => {
    findViewer(String(id)).then((viewer) => done(null, viewer ?? false), done)
  })

  const sessions = session({
    name: sessionCookieName(secure),
    secret: sessionSecret,
    store: new SessionStore(),
    resave: false,
    saveUninitialized: false,
    unset: 'destroy',
    cookie: { httpOnly: true, sameSite: 'strict', secure, path: '/' },
  })

  const viewer: RequestHandler = async (req, _res, next) => {
    const found = req.user as Awaited<ReturnType<typeof findViewer>> | undefined
    if (found) {
      req.actor.viewer = found
      if (req.get('X-Fanflower-Background') === undefined)
        await markSeen(req.sessionID, req.session.lastSeenAt)
    }
    next()
  }

  /** Remembers this browser for the account, so that strangers' guesses elsewhere do not lock it out. */
  const rememberDevice = (req: Request): string => {
    const name = cookieName(secure, deviceCookie)
    const token = cookieValue(req, name) ?? newToken()
    req.res?.cookie(name, token, {
      httpOnly: true,
      sameSite: 'strict',
      secure,
      path: '/',
      maxAge: deviceDays * 86_400_000,
    })
    return token
  }

  return { sessions, passport, authenticate: passport.session(), viewer, rememberDevice }
}

export type SignInMiddleware = ReturnType<typeof createSignIn>
