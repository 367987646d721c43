import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { createServer, type AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { createConnection } from 'mysql2/promise'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { connectionOptions, type DatabaseAccess } from '../../server/setup/databaseAccess.ts'
import { accountOf, applyGrants, findRightsProblems, type SqlRunner } from '../../server/setup/grants.ts'
import { startMariaDb, type MariaDb } from '../../server/setup/mariadb.ts'
import { createEmptyDatabase, testDatabaseAccess, testDatabaseName } from '../support/database.ts'

/** Signs in, runs one piece of work and signs out. `query` answers with rows, as TypeORM's does. */
async function as<T>(access: DatabaseAccess, work: (runner: SqlRunner) => Promise<T>): Promise<T> {
  const connection = await createConnection(connectionOptions(access))
  try {
    return await work({ query: async (sql, parameters) => (await connection.query(sql, parameters))[0] })
  } finally {
    await connection.end()
  }
}
const run = (access: DatabaseAccess, sql: string) => as(access, (runner) => runner.query(sql))

describe('the three database accounts', () => {
  const access = testDatabaseAccess()
  const name = testDatabaseName()
  const grant = (rights: { updatable: string[]; deletable: string[] }) =>
    as(access.migrate, async (owner) => applyGrants(owner, name, await accountOf(access.app), rights))
  const problems = (rights: { updatable: string[]; deletable: string[] }) =>
    as(access.app, (app) => findRightsProblems(app, name, rights))

  beforeAll(async () => {
    await createEmptyDatabase()
    await run(access.migrate, 'CREATE TABLE notes (id INT PRIMARY KEY, body VARCHAR(5), heldOn DATE)')
    await run(access.migrate, 'CREATE TABLE tasks (id INT PRIMARY KEY)')
    await run(access.migrate, 'CREATE TABLE migrations (id INT PRIMARY KEY)')
  })

  it('lets the app account in nowhere before rights are given', async () => {
    await run(access.migrate, `REVOKE ALL PRIVILEGES ON notes FROM '${access.app.user}'@'127.0.0.1'`).catch(
      (error: { code: string }) => expect(error.code).toBe('ER_NONEXISTING_TABLE_GRANT'),
    )
    await expect(run(access.app, 'SELECT * FROM notes')).rejects.toThrow(/denied/)
  })

  it('gives the app account rows to read and add everywhere, to change and delete only where listed', async () => {
    await grant({ updatable: ['tasks'], deletable: ['tasks'] })
    await run(access.app, "INSERT INTO notes VALUES (1, 'first', '2026-03-03')")
    await run(access.app, 'INSERT INTO tasks VALUES (1), (2)')
    await run(access.app, 'UPDATE tasks SET id = 3 WHERE id = 1')
    await run(access.app, 'DELETE FROM tasks WHERE id = 2')
    for (const sql of [
      "UPDATE notes SET body = 'other'",
      'DELETE FROM notes',
      "REPLACE INTO notes VALUES (1, 'other', NULL)",
      "INSERT INTO notes VALUES (1, 'other', NULL) ON DUPLICATE KEY UPDATE body = 'other'",
      'INSERT INTO migrations VALUES (1)',
    ]) {
      await expect(run(access.app, sql), sql).rejects.toMatchObject({ code: 'ER_TABLEACCESS_DENIED_ERROR' })
    }
    expect(await run(access.app, 'SELECT body FROM notes')).toEqual([{ body: 'first' }])
  })

  it.each([
    'TRUNCATE TABLE tasks',
    'DROP TABLE tasks',
    'ALTER TABLE tasks ADD extra INT',
    'CREATE TABLE others (id INT)',
    'CREATE INDEX extra ON tasks (id)',
    'CREATE TRIGGER extra BEFORE INSERT ON tasks FOR EACH ROW SET NEW.id = 1',
    "GRANT SELECT ON tasks TO 'fanflower_backup'@'127.0.0.1'",
    'SELECT * FROM mysql.user',
    'SET GLOBAL sql_mode = ""',
  ])('keeps the app account from %s', async (sql) => {
    await expect(run(access.app, sql)).rejects.toThrow(/denied/i)
  })

  it('takes back what is no longer listed, and names every difference until then', async () => {
    await grant({ updatable: ['tasks', 'notes'], deletable: ['tasks'] })
    const less = { updatable: ['tasks'], deletable: [] }
    expect(await problems(less)).toEqual([
      'the app account must not have UPDATE on notes',
      'the app account must not have DELETE on tasks',
    ])
    await grant(less)
    expect(await problems(less)).toEqual([])
    expect(await problems({ updatable: ['tasks'], deletable: ['tasks'] })).toEqual([
      'the app account lacks DELETE on tasks',
    ])
    await expect(run(access.app, 'DELETE FROM tasks')).rejects.toMatchObject({
      code: 'ER_TABLEACCESS_DENIED_ERROR',
    })
  })

  it('names rights on the whole database as a difference', async () => {
    const app = `'${access.app.user}'@'127.0.0.1'`
    await run(access.migrate, `GRANT DELETE ON \`test\\_%\`.* TO ${app}`)
    expect(await problems({ updatable: ['tasks'], deletable: [] })).toContain(
      'the app account must not have DELETE on every table',
    )
    await run(access.migrate, `REVOKE DELETE ON \`test\\_%\`.* FROM ${app}`)
  })

  it('refuses a list that names a table the schema does not have', async () => {
    await expect(grant({ updatable: ['task'], deletable: [] })).rejects.toThrow(
      /no table of the schema: task$/,
    )
  })

  it('lets the backup account read everything and change nothing', async () => {
    expect(await run(access.backup, 'SELECT COUNT(*) AS n FROM notes')).toEqual([{ n: 1 }])
    await expect(run(access.backup, 'DELETE FROM notes')).rejects.toThrow(/denied/)
  })

  it('keeps the owner account inside its own databases', async () => {
    await expect(run(access.migrate, 'CREATE DATABASE elsewhere')).rejects.toThrow(/denied/)
  })

  it('refuses impossible dates and over-long text, and keeps time in UTC', async () => {
    await expect(run(access.app, "INSERT INTO notes VALUES (2, 'x', '2021-02-30')")).rejects.toThrow(
      /Incorrect date/,
    )
    await expect(run(access.app, "INSERT INTO notes VALUES (2, 'longer', NULL)")).rejects.toThrow(/too long/)
    expect(
      await run(
        access.app,
        'SELECT @@time_zone AS zone, @@max_allowed_packet AS packet, @@collation_database AS c',
      ),
    ).toEqual([{ zone: '+00:00', packet: 64 * 1024 * 1024, c: 'utf8mb4_unicode_ci' }])
  })
})

describe('the private MariaDB of npm start', () => {
  const folder = mkdtempSync(join(tmpdir(), 'fanflower-private-'))
  const start = (port: number | null = null, onUnexpectedEnd?: (message: string) => void) =>
    startMariaDb({ dataDir: folder, port, durability: 'full', onUnexpectedEnd })
  let mariadb: MariaDb
  beforeAll(async () => {
    mariadb = await start()
    await run(mariadb.access('migrate'), 'CREATE TABLE notes (id INT PRIMARY KEY)')
  })
  afterAll(async () => {
    await mariadb.stop()
    rmSync(folder, { recursive: true, force: true })
  })

  it('keeps its passwords readable by the owner only and leaves no file that sets them', () => {
    expect(statSync(join(folder, 'passwords.json')).mode & 0o077).toBe(0)
    expect(() => statSync(join(folder, 'accounts.sql'))).toThrow(/ENOENT/)
  })

  it('refuses a second start while the first lives, and leaves the first alone', async () => {
    await expect(start()).rejects.toThrow(new RegExp(`^Already running: process ${process.pid} `))
    expect(await run(mariadb.access('migrate'), 'SELECT 1 AS one')).toEqual([{ one: 1 }])
  })

  it('keeps every confirmed row when MariaDB is killed and started again', async () => {
    await as(mariadb.access('migrate'), async (owner) => {
      for (let id = 1; id <= 50; id += 1) await owner.query('INSERT INTO notes VALUES (?)', [id])
      process.kill(mariadb.pid(), 'SIGKILL')
    }).catch(() => undefined)
    await mariadb.stop()
    mariadb = await start()
    expect(await run(mariadb.access('migrate'), 'SELECT COUNT(*) AS n FROM notes')).toEqual([{ n: 50 }])
  })

  it('starts MariaDB again on the same port when it ends by itself, and says so', async () => {
    await mariadb.stop()
    const messages: string[] = []
    mariadb = await start(null, (message) => {
      messages.push(message)
    })
    const killed = mariadb.pid()
    process.kill(killed, 'SIGKILL')
    await expect
      .poll(
        () => mariadb.pid() !== killed && run(mariadb.access('migrate'), 'SELECT 1 AS one').catch(() => null),
        {
          timeout: 10_000,
        },
      )
      .toEqual([{ one: 1 }])
    expect(messages).toEqual(['MariaDB ended by itself (SIGKILL); starting it again.'])
  })

  it('names a taken port and the way to choose another', async () => {
    const stranger = createServer().listen(0, '127.0.0.1')
    await new Promise((resolve) => stranger.once('listening', resolve))
    const { port } = stranger.address() as AddressInfo
    await mariadb.stop()
    await expect(start(port)).rejects.toThrow(
      `Port ${port} is already in use, and MariaDB needs it. Choose another: DB_PORT=${port + 10} npm start`,
    )
    stranger.close()
    mariadb = await start()
  })

  it('takes over after a start whose process is dead', async () => {
    await mariadb.stop()
    writeFileSync(join(folder, 'owner'), '1:1')
    mariadb = await start()
    expect(readFileSync(join(folder, 'owner'), 'utf8')).toMatch(new RegExp(`^${process.pid}:\\d+$`))
  })
})
