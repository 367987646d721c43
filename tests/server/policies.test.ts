import express, { Router } from 'express'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { allow } from '../../server/middleware/allow.ts'
import { assertPolicies, routeTable } from '../../server/middleware/checkPolicies.ts'
import { openPolicy } from '../../server/policies/policy.ts'
import { startApp, stopApp } from '../support/app.ts'

beforeAll(startApp)
afterAll(stopApp)

const appWith = (router: Router) => {
  const app = express()
  app.use('/api', router)
  return app
}

describe('the boot', () => {
  it('stops when a route declares no policy, and names it', () => {
    const router = Router()
    router.get('/with', allow(openPolicy('with', 'a test')), (_req, res) => void res.end())
    router.post('/without', (_req, res) => void res.end())
    expect(() => assertPolicies(appWith(router))).toThrow('POST /api/without')
  })

  it('stops when the policy is not the first handler of the route', () => {
    const router = Router()
    router.get('/late', (_req, _res, next) => next(), allow(openPolicy('late', 'a test')))
    expect(() => assertPolicies(appWith(router))).toThrow('GET /api/late')
  })

  it('finds a policy on every route of the app, open ones only for the way in, the state of the server and the link of a carer', () => {
    const app = createApp({
      appUrl: 'http://127.0.0.1',
      sessionSecret: 'x'.repeat(40),
      demo: false,
      inboxUrl: null,
      demoSignIns: [],
      clientDir: null,
    })
    const routes = routeTable(app)
    expect(routes.length).toBeGreaterThan(20)
    const open = routes
      .filter((route) => route.policy?.kind === 'open')
      .map((route) => `${route.method} ${route.path}`)
    expect(open.sort()).toEqual([
      'GET /api/health',
      'GET /api/session',
      'POST /api/answer-links/open',
      'POST /api/answer-links/send',
      'POST /api/invitations/confirm',
      'POST /api/password-resets',
      'POST /api/password-resets/confirm',
      'POST /api/sign-in',
      'POST /api/sign-out',
      'PUT /api/answer-links',
    ])
    const childRoutes = routes.filter((route) => route.path.includes(':childId'))
    for (const route of childRoutes)
      expect(['child', 'role'], `${route.method} ${route.path}`).toContain(route.policy?.kind)
  })
})
