import { spawn, type ChildProcess } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, linkSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import { setTimeout as wait } from 'node:timers/promises'
import { createConnection } from 'mysql2/promise'
import { connectionOptions, type DatabaseAccess } from './databaseAccess.ts'
import {
  accountNames,
  accountStatements,
  findProgram,
  installDataFiles,
  loadPasswords,
  needProgram,
  runAsArguments,
  type AccountRole,
} from './mariadbFiles.ts'
import { commandLine, endProcess, findFreePort, isPortFree, livingProcess, processMark } from './processes.ts'
import { SetUpError } from './setUpError.ts'

export type MariaDbOptions = {
  /** Everything MariaDB keeps lives below this folder. */
  dataDir: string
  /** Null takes any free port. */
  port: number | null
  /** `throwaway` trades safety for speed and is for tests only: a power cut may lose what was confirmed. */
  durability: 'full' | 'throwaway'
  /** The database's name, or for tests a grant pattern such as `test\_%`. */
  databases?: string
  /** Start MariaDB again when it ends by itself; the callback is told the reason. */
  onUnexpectedEnd?: (message: string) => void
}

export type MariaDb = {
  host: '127.0.0.1'
  port: number
  /** The number of the running mariadbd process. */
  pid: () => number
  /** Access to one database (by default the one it was started for) with one of the three accounts. */
  access: (role: AccountRole, database?: string) => DatabaseAccess
  /** Ends MariaDB cleanly. May be called twice. */
  stop: () => Promise<void>
}

const strictMode = [
  'STRICT_ALL_TABLES',
  'NO_ZERO_DATE',
  'NO_ZERO_IN_DATE',
  'ERROR_FOR_DIVISION_BY_ZERO',
  'ONLY_FULL_GROUP_BY',
  'NO_ENGINE_SUBSTITUTION',
].join(',')

const throwawayArguments = [
  '--innodb-flush-log-at-trx-commit=0',
  '--innodb-flush-method=nosync',
  '--innodb-doublewrite=0',
  '--innodb-log-file-size=16M',
]

/** The kernel cuts socket paths at 108 bytes, so a deep data folder gets its socket under a short name elsewhere. */
function socketPath(dataDir: string): string {
  const path = join(dataDir, 'mariadb.sock')
  if (Buffer.byteLength(path) < 104) return path
  const short = createHash('sha256').update(dataDir).digest('hex').slice(0, 16)
  return join(tmpdir(), `fanflower-${short}.sock`)
}

/** Writes our mark into the owner file, or refuses while the process named there lives. */
function takeOwnership(dataDir: string): void {
  const owner = join(dataDir, 'owner')
  const mine = `${owner}.${process.pid}`
  writeFileSync(mine, processMark(process.pid))
  try {
    for (let attempt = 0; ; attempt += 1) {
      try {
        // A link is made whole or not at all, so of two starts at once only one wins.
        linkSync(mine, owner)
        return
      } catch (error) {
        if ((error as NodeJS.ErrnoException).code !== 'EEXIST' || attempt > 3) throw error
      }
      const other = livingProcess(readFileSync(owner, 'utf8'))
      if (other !== null) {
        throw new SetUpError(
          `Already running: process ${other} uses the data folder ${dataDir}. ` +
            'Stop it first, or choose another folder and port: DATA_DIR=… PORT=… npm start',
        )
      }
      rmSync(owner, { force: true })
    }
  } finally {
    rmSync(mine, { force: true })
  }
}

/** Ends a mariadbd left over from a launcher that was killed, if the pid file's process really is ours. */
async function endOrphan(pidFile: string, files: string): Promise<void> {
  if (!existsSync(pidFile)) return
  const pid = Number(readFileSync(pidFile, 'utf8').trim())
  if (commandLine(pid).includes(`--datadir=${files}`)) await endProcess(pid, 60_000)
  rmSync(pidFile, { force: true })
}

const lastLines = (file: string) =>
  existsSync(file) ? readFileSync(file, 'utf8').trimEnd().split('\n').slice(-5).join('\n') : ''

/**
 * Starts a private MariaDB on loopback with its own data folder and three accounts, and waits until it answers.
 * Recovers by itself after a crash of either side. Throws a SetUpError when MariaDB is missing, the port is taken, or
 * another living process uses the folder.
 */
export async function startMariaDb(options: MariaDbOptions): Promise<MariaDb> {
  const dataDir = resolve(options.dataDir)
  const databases = options.databases ?? 'fanflower'
  const files = join(dataDir, 'files')
  const pidFile = join(dataDir, 'mariadb.pid')
  const logFile = join(dataDir, 'mariadb.log')
  const ownerFile = join(dataDir, 'owner')
  const program = needProgram('mariadbd')
  mkdirSync(dataDir, { recursive: true, mode: 0o700 })
  takeOwnership(dataDir)
  const giveUp = (error: unknown): never => {
    rmSync(ownerFile, { force: true })
    throw error
  }

  await endOrphan(pidFile, files).catch(giveUp)
  const port = options.port ?? (await findFreePort())
  if (!(await isPortFree(port))) {
    giveUp(
      new SetUpError(
        `Port ${port} is already in use, and MariaDB needs it. Choose another: DB_PORT=${port + 10} npm start`,
      ),
    )
  }
  await installDataFiles(files).catch(giveUp)
  const passwords = loadPasswords(join(dataDir, 'passwords.json'))
  const access = (role: AccountRole, database = databases): DatabaseAccess => ({
    host: '127.0.0.1',
    port,
    user: accountNames[role],
    password: passwords[role],
    database,
    tls: false,
  })

  const launch = async (): Promise<ChildProcess> => {
    const initFile = join(dataDir, 'accounts.sql')
    writeFileSync(initFile, accountStatements(databases, passwords), { mode: 0o600 })
    const command = [
      program,
      '--no-defaults',
      ...runAsArguments(),
      `--datadir=${files}`,
      '--bind-address=127.0.0.1',
      `--port=${port}`,
      `--socket=${socketPath(dataDir)}`,
      `--pid-file=${pidFile}`,
      `--log-error=${logFile}`,
      `--init-file=${initFile}`,
      '--skip-name-resolve',
      '--skip-log-bin',
      '--character-set-server=utf8mb4',
      '--collation-server=utf8mb4_unicode_ci',
      '--default-time-zone=+00:00',
      '--max-allowed-packet=64M',
      '--local-infile=0',
      '--performance-schema=OFF',
      `--sql-mode=${strictMode}`,
      ...(options.durability === 'throwaway' ? throwawayArguments : ['--innodb-flush-log-at-trx-commit=1']),
    ]
    // The kernel ends MariaDB when this process dies, however it dies.
    const setpriv = findProgram('setpriv')
    if (setpriv !== null) command.unshift(setpriv, '--pdeathsig', 'TERM')
    const [first = program, ...rest] = command
    // Detached: Ctrl-C in a terminal must reach only Node, which closes HTTP and the connections before MariaDB.
    const child = spawn(first, rest, { detached: true, stdio: 'ignore' })
    let failure: string | null = null
    child.once('error', (error) => (failure = error.message))
    child.once('exit', (code, signal) => (failure = `it ended with ${signal ?? `code ${code}`}`))
    try {
      for (const until = performance.now() + 120_000; ; await wait(25)) {
        if (failure !== null)
          throw new SetUpError(`MariaDB did not start: ${failure}.\n${lastLines(logFile)}`)
        if (await answers(access('migrate'))) return child
        if (performance.now() > until) {
          throw new SetUpError(`MariaDB did not answer within two minutes.\n${lastLines(logFile)}`)
        }
      }
    } catch (error) {
      child.kill('SIGKILL')
      throw error
    } finally {
      rmSync(initFile, { force: true })
    }
  }

  let stopping = false
  let child = await launch().catch(giveUp)
  const restarts: number[] = []
  const watch = () =>
    child.once('exit', (code, signal) => {
      if (stopping || options.onUnexpectedEnd === undefined) return
      const reason = `MariaDB ended by itself (${signal ?? `code ${code}`})`
      restarts.push(performance.now())
      const recent = restarts.filter((at) => at > performance.now() - 60_000).length
      if (recent > 5)
        return options.onUnexpectedEnd(`${reason} too often; it is not started again. See ${logFile}`)
      options.onUnexpectedEnd(`${reason}; starting it again.`)
      launch().then(
        (next) => {
          child = next
          watch()
          if (stopping) child.kill('SIGTERM')
        },
        (error: Error) => options.onUnexpectedEnd?.(error.message),
      )
    })
  watch()

  const stop = async (): Promise<void> => {
    stopping = true
    if (child.pid !== undefined) await endProcess(child.pid, 60_000)
    rmSync(ownerFile, { force: true })
  }
  return { host: '127.0.0.1', port, pid: () => child.pid ?? 0, access, stop }
}

/** True once the owner account can sign in. Nobody listening yet is the only failure that is waited out. */
async function answers(access: DatabaseAccess): Promise<boolean> {
  // A pattern of test databases names none that exists.
  const { database, ...server } = connectionOptions(access)
  const target = database.includes('%') ? server : { ...server, database }
  try {
    const connection = await createConnection({ ...target, connectTimeout: 5_000 })
    await connection.end()
    return true
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ECONNREFUSED') return false
    throw error
  }
}
