import type { Express } from 'express'
import request, { type Test } from 'supertest'
import { createApp } from '../../server/app.ts'
import { closeDatabase } from '../../server/dataSource.ts'
import type { User } from '../../server/entities/User.ts'
import { openClinicDatabase } from './clinicDatabase.ts'
import { testPassword } from './factories.ts'

export const testAppUrl = 'http://127.0.0.1'

let app: Express | null = null

/** A fresh clinic database and the real app on it. Call in beforeAll, and `stopApp` in afterAll. */
export const startApp = async (): Promise<void> => {
  await openClinicDatabase()
  app = createApp({
    appUrl: testAppUrl,
    sessionSecret: 'only-for-tests-only-for-tests-only',
    demo: false,
    inboxUrl: null,
    demoSignIns: [],
    clientDir: null,
  })
}

/** For tests that open their own database and app. */
export const useApp = (other: Express): void => {
  app = other
}

export const stopApp = async (): Promise<void> => {
  app = null
  await closeDatabase()
}

const running = (): Express => {
  if (!app) throw new Error('Call startApp first')
  return app
}

/** Requests as Fanflower's own pages make them: same origin, and the header that says for whom the page was made. */
export const client = (userId = 'none', cookie: string[] = []) => {
  const dressed = (test: Test) => {
    void test.set('X-Fanflower-User', userId).set('Sec-Fetch-Site', 'same-origin')
    return cookie.length > 0 ? test.set('Cookie', cookie) : test
  }
  return {
    userId,
    cookie,
    get: (path: string) => dressed(request(running()).get(path)),
    post: (path: string) => dressed(request(running()).post(path)),
    put: (path: string) => dressed(request(running()).put(path)),
    patch: (path: string) => dressed(request(running()).patch(path)),
    delete: (path: string) => dressed(request(running()).delete(path)),
  }
}

export type Client = ReturnType<typeof client>

/** Signs a person in over HTTP with the password every built user has. */
export const signedInAs = async (user: Pick<User, 'id' | 'email'>): Promise<Client> => {
  const response = await client()
    .post('/api/sign-in')
    .send({ email: user.email, password: testPassword, sharedComputer: false })
  if (response.status !== 200)
    throw new Error(`Sign-in failed: ${response.status} ${JSON.stringify(response.body)}`)
  const cookies = ([] as string[])
    .concat(response.headers['set-cookie'] ?? [])
    .map((line) => line.split(';')[0] ?? '')
  return client(user.id, cookies)
}
