import { Router, type Request } from 'express'
import {
  passwordChangeSchema,
  passwordResetRequestSchema,
  profileSchema,
  signInSchema,
  tokenPasswordSchema,
  type SessionView,
  type TokenPurpose,
} from '../../shared/users.ts'
import { AppError } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf } from '../middleware/requestBody.ts'
import { viewerOf } from '../middleware/requestContext.ts'
import { idleSecondsOf, sessionHash } from '../services/sessions.ts'
import type { SignInMiddleware } from '../middleware/signIn.ts'
import { sessionPolicies } from '../policies/session.ts'
import { presentSessionUser } from '../presenters/users.ts'
import {
  changePassword,
  findViewer,
  noteSignIn,
  requestPasswordReset,
  useToken,
} from '../services/accounts.ts'
import { isDatabaseUp } from '../services/health.ts'
import { changeProfile } from '../services/profile.ts'
import { clinicToday, readSettings } from '../services/settings.ts'
import type { User } from '../entities/User.ts'

export interface SessionRouteSettings {
  appUrl: string
  demo: boolean
  inboxUrl: string | null
  demoSignIns: SessionView['demoSignIns']
}

export const sessionRoutes = (signIn: SignInMiddleware, settings: SessionRouteSettings): Router => {
  const router = Router()

  const sessionView = async (req: Request, user: User | null): Promise<SessionView> => {
    const clinic = await readSettings()
    return {
      user: user && presentSessionUser(user),
      clinic: {
        name: clinic.clinicName,
        timeZone: clinic.timeZone,
        today: clinicToday(clinic),
        demo: settings.demo,
        inboxUrl: settings.inboxUrl,
      },
      idleSecondsLeft: user ? idleSecondsOf(req.session) : null,
      demoSignIns: user ? [] : settings.demoSignIns,
    }
  }

  router.get('/health', allow(sessionPolicies.health), async (_req, res) => {
    const up = await isDatabaseUp()
    if (!up) res.setHeader('Retry-After', '2')
    res.status(up ? 200 : 503).json({ status: up ? 'ok' : 'unavailable' })
  })

  router.get('/session', allow(sessionPolicies.read), async (req, res) => {
    const found = req.actor.viewer ? await findViewer(req.actor.viewer.id) : null
    res.json(await sessionView(req, found?.user ?? null))
  })

  router.post('/sign-in', allow(sessionPolicies.signIn), async (req, res) => {
    const { sharedComputer } = await bodyOf(req, signInSchema)
    const user = await new Promise<User | false>((resolve, reject) => {
      void signIn.passport.authenticate('local', (error: unknown, found: User | false) =>
        error ? reject(error) : resolve(found),
      )(req, res, reject)
    })
    if (!user)
      throw new AppError(
        401,
        'sign_in_failed',
        'This address and password do not go together. Check both and try again.',
      )
    // passport gives the session a new id here, so that an id planted before the sign-in is worth nothing.
    await new Promise<void>((resolve, reject) =>
      req.login(user, (error: unknown) => (error ? reject(error) : resolve())),
    )
    req.session.sharedComputer = sharedComputer
    await noteSignIn(user, req.actor.requestId, signIn.rememberDevice(req))
    const found = await findViewer(user.id)
    res.json(await sessionView(req, found?.user ?? user))
  })

  router.post('/sign-out', allow(sessionPolicies.signOut), async (req, res) => {
    await new Promise<void>((resolve, reject) =>
      req.session.destroy((error: unknown) => (error ? reject(error) : resolve())),
    )
    res.setHeader('Clear-Site-Data', '"cache", "storage"')
    res.status(204).end()
  })

  router.post('/password-resets', allow(sessionPolicies.requestReset), async (req, res) => {
    const { email } = await bodyOf(req, passwordResetRequestSchema)
    await requestPasswordReset(email, req.ip ?? 'unknown', req.actor.requestId, settings.appUrl)
    res.status(204).end()
  })

  const confirm = (path: string, purpose: TokenPurpose) =>
    router.post(path, allow(sessionPolicies.useToken), async (req, res) => {
      const { token, newPassword } = await bodyOf(req, tokenPasswordSchema)
      await useToken(token, purpose, newPassword, req.ip ?? 'unknown', req.actor.requestId)
      res.status(204).end()
    })
  confirm('/password-resets/confirm', 'password_reset')
  confirm('/invitations/confirm', 'invitation')

  router.patch('/me', allow(sessionPolicies.changeProfile), async (req, res) => {
    const profile = await bodyOf(req, profileSchema)
    res.json(await sessionView(req, await changeProfile(req.actor, viewerOf(req), profile)))
  })

  router.post('/me/password', allow(sessionPolicies.changePassword), async (req, res) => {
    const { currentPassword, newPassword } = await bodyOf(req, passwordChangeSchema)
    await changePassword(req.actor, viewerOf(req), currentPassword, newPassword, sessionHash(req.sessionID))
    res.status(204).end()
  })

  return router
}
