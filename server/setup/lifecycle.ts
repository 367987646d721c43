import { randomBytes } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { createServer, type RequestListener, type Server } from 'node:http'
import { join } from 'node:path'
import type { Env } from '../env.ts'
import type { DatabaseAccess } from './databaseAccess.ts'
import { startMailFakeProcess } from './mailFakeProcess.ts'
import { startMariaDb } from './mariadb.ts'
import { SetUpError } from './setUpError.ts'
import type { Shutdown } from './shutdown.ts'

export type Database = {
  app: DatabaseAccess
  /** The owner account; null when only the app account of an existing MariaDB was given: then nothing is migrated. */
  migrate: DatabaseAccess | null
}

/** The configured MariaDB, or a private one started below DATA_DIR and stopped with everything else. */
export async function prepareDatabase(
  env: Env,
  shutdown: Shutdown,
  warn: (message: string) => void = console.error,
): Promise<Database> {
  if (env.database !== null) return { app: env.database, migrate: env.databaseMigrate }
  const mariadb = await startMariaDb({
    dataDir: join(env.dataDir, 'mariadb'),
    port: env.databasePort,
    durability: 'full',
    onUnexpectedEnd: warn,
  })
  shutdown.add('MariaDB', mariadb.stop)
  return { app: mariadb.access('app'), migrate: mariadb.access('migrate') }
}

export type Mail = {
  smtpUrl: string
  /** Address of the mail fake's inbox page; null when real mail is configured. */
  inboxUrl: string | null
}

/** The configured mail server, or the mail fake started beside us and stopped with everything else. */
export async function prepareMail(env: Env, shutdown: Shutdown): Promise<Mail> {
  if (env.smtpUrl !== null) return { smtpUrl: env.smtpUrl, inboxUrl: null }
  const fake = await startMailFakeProcess(env.inboxPort)
  shutdown.add('the mail fake', fake.stop)
  return fake
}

/** The configured secret, or one drawn once and kept in DATA_DIR, readable by the owner only. */
export function loadSessionSecret(env: Env): string {
  if (env.sessionSecret !== null) return env.sessionSecret
  const file = join(env.dataDir, 'session-secret')
  if (!existsSync(file)) {
    mkdirSync(env.dataDir, { recursive: true, mode: 0o700 })
    writeFileSync(file, randomBytes(48).toString('base64url'), { mode: 0o600 })
  }
  return readFileSync(file, 'utf8')
}

/**
 * Listens with the app; on loopback only while APP_URL is this machine. A taken port is a SetUpError that names it.
 * Stopping lets requests under way finish for five seconds.
 */
export async function listen(app: RequestListener, env: Env, shutdown: Shutdown): Promise<Server> {
  const server = createServer(app)
  await new Promise<void>((resolve, reject) => {
    server.once('error', (error: NodeJS.ErrnoException) => reject(listenError(error, env.port)))
    server.listen({ port: env.port, ...(env.loopback ? { host: '127.0.0.1' } : {}) }, resolve)
  })
  shutdown.add('the web server', () => closeServer(server))
  return server
}

function listenError(error: NodeJS.ErrnoException, port: number): Error {
  if (error.code === 'EADDRINUSE') {
    return new SetUpError(`Port ${port} is already in use. Choose another: PORT=${port + 100} npm start`)
  }
  if (error.code === 'EACCES') {
    return new SetUpError(`Port ${port} needs special rights. Choose one above 1023: PORT=3000 npm start`)
  }
  return error
}

function closeServer(server: Server): Promise<void> {
  return new Promise((resolve) => {
    server.close(() => resolve())
    server.closeIdleConnections()
    setTimeout(() => server.closeAllConnections(), 5_000).unref()
  })
}

/** Prints lines as one block set off by blank lines, after everything is up. */
export function printBlock(lines: readonly string[]): void {
  console.log(['', ...lines.map((line) => `  ${line}`), ''].join('\n'))
}
