import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import compression from 'compression'
import express, { type Express } from 'express'
import type { SessionView } from '../shared/users.ts'
import { notFound } from './errors.ts'
import { boundedBody } from './middleware/bodyBounds.ts'
import { assertPolicies } from './middleware/checkPolicies.ts'
import { errorHandler } from './middleware/errorHandler.ts'
import { requestContext } from './middleware/requestContext.ts'
import { sameSiteOnly, sameUserOnly } from './middleware/sameSite.ts'
import { cspNonce, neverStored, permissionsPolicy, securityHeaders } from './middleware/securityHeaders.ts'
import { createSignIn } from './middleware/signIn.ts'
import { nounRoutes } from './routes/all.ts'
import { sessionRoutes } from './routes/session.ts'

export interface AppSettings {
  appUrl: string
  sessionSecret: string
  demo: boolean
  inboxUrl: string | null
  demoSignIns: SessionView['demoSignIns']
  /** Folder of the built client; null serves the API alone (tests, `npm run dev`). */
  clientDir: string | null
}

/** Builds the app. Listening, the database and jobs belong to main.ts. Throws when a route declares no policy. */
export const createApp = (settings: AppSettings): Express => {
  const app = express()
  const secure = settings.appUrl.startsWith('https:')
  app.disable('x-powered-by')
  app.set('query parser', 'simple')
  app.set('etag', false)
  if (secure) app.set('trust proxy', 'loopback')
  app.use(cspNonce, securityHeaders(secure), permissionsPolicy, requestContext, compression())

  const signIn = createSignIn({ secure, sessionSecret: settings.sessionSecret })
  app.use(
    '/api',
    neverStored,
    sameSiteOnly(settings.appUrl),
    express.json({ limit: '256kb' }),
    boundedBody,
    signIn.sessions,
    signIn.authenticate,
    signIn.viewer,
    sameUserOnly,
    sessionRoutes(signIn, settings),
    ...nounRoutes({ appUrl: settings.appUrl }),
  )
  app.use('/api', () => {
    throw notFound()
  })
  if (settings.clientDir) serveClient(app, settings.clientDir)
  app.use(() => {
    throw notFound()
  })
  app.use(errorHandler)
  assertPolicies(app)
  return app
}

/** Built files, and the one page for every other address; its nonce is filled in for each answer. */
const serveClient = (app: Express, clientDir: string) => {
  const page = join(clientDir, 'index.html')
  if (!existsSync(page)) throw new Error('The client has not been built')
  const html = readFileSync(page, 'utf8')
  app.use(
    '/assets',
    express.static(join(clientDir, 'assets'), {
      index: false,
      immutable: true,
      maxAge: '1y',
      dotfiles: 'ignore',
    }),
    () => {
      throw notFound()
    },
  )
  app.use((req, res, next) => {
    if (!['GET', 'HEAD'].includes(req.method) || /\.[a-z0-9]+$/i.test(req.path)) return next()
    res.setHeader('Cache-Control', 'no-store')
    res.type('html').send(html.replace('__CSP_NONCE__', res.locals.nonce))
  })
}
