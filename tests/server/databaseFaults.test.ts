import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createConnection } from 'mysql2/promise'
import { createApp } from '../../server/app.ts'
import { closeDatabase, openDatabase } from '../../server/dataSource.ts'
import { openAuditChain } from '../../server/services/audit.ts'
import { connectionOptions } from '../../server/setup/databaseAccess.ts'
import { migrateDatabase } from '../../server/setup/migrateDatabase.ts'
import { startTestMariaDb } from '../support/mariadb.ts'
import { client, signedInAs, useApp } from '../support/app.ts'
import { letterScene, readyText } from '../support/letters.ts'

// A MariaDB of its own, because it is killed.
let mariadb: Awaited<ReturnType<typeof startTestMariaDb>>
const name = 'test_faults'

beforeAll(async () => {
  mariadb = await startTestMariaDb()
  const { database: _, ...server } = connectionOptions(mariadb.access('migrate', name))
  const owner = await createConnection(server)
  await owner.query(`CREATE DATABASE ${name} CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`)
  await owner.end()
  await migrateDatabase(mariadb.access('migrate', name), mariadb.access('app', name))
  await openDatabase(mariadb.access('app', name))
  await openAuditChain('test')
  useApp(
    createApp({
      appUrl: 'http://127.0.0.1',
      sessionSecret: 'x'.repeat(40),
      demo: false,
      inboxUrl: null,
      demoSignIns: [],
      clientDir: null,
    }),
  )
}, 60_000)
afterAll(async () => {
  await closeDatabase()
  await mariadb.remove()
})

describe('while MariaDB is away', () => {
  it('every answer is 503 with a time to come back, and all is well again once it is back, without a restart', async () => {
    const scene = await letterScene()
    const { body: letter } = await scene.as.post(scene.base).send({ kind: 'progress' })
    process.kill(mariadb.pid(), 'SIGKILL')
    const during = await scene.as
      .put(`${scene.base}/${letter.id}`)
      .set('If-Match', `"${letter.version}"`)
      .send(readyText)
    expect(during.status).toBe(503)
    expect(Number(during.headers['retry-after'])).toBeGreaterThan(0)
    expect(during.body.message).toMatch(/Nothing was saved/)
    expect((await client().get('/api/health')).status).toBe(503)
    expect(
      (
        await client()
          .post('/api/sign-in')
          .send({ email: 'a@harrowmere.example', password: 'x', sharedComputer: false })
      ).status,
    ).toBe(503)

    const { port, folder } = mariadb
    await mariadb.stop()
    mariadb = await startTestMariaDb(folder, port)
    expect((await client().get('/api/health')).status).toBe(200)
    const after = await scene.as
      .put(`${scene.base}/${letter.id}`)
      .set('If-Match', `"${letter.version}"`)
      .send(readyText)
    expect(after.status).toBe(200)
    expect(
      (await (await signedInAs(scene.therapist)).get(`${scene.base}/${letter.id}`)).body.salutation,
    ).toBe('Dear parent')
  }, 60_000)
})
