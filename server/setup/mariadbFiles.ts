import { execFile } from 'node:child_process'
import { randomBytes } from 'node:crypto'
import {
  accessSync,
  constants,
  existsSync,
  mkdirSync,
  readFileSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs'
import { delimiter, join } from 'node:path'
import { promisify } from 'node:util'
import { SetUpError } from './setUpError.ts'

const run = promisify(execFile)
const isRoot = () => process.getuid?.() === 0

export const accountNames = {
  migrate: 'fanflower_migrate',
  app: 'fanflower_app',
  backup: 'fanflower_backup',
} as const
export type AccountRole = keyof typeof accountNames

/** The program's path, looked for also in the folders an ordinary user's PATH leaves out. */
export function findProgram(name: string): string | null {
  const folders = [...(process.env.PATH ?? '').split(delimiter), '/usr/sbin', '/usr/local/sbin', '/usr/bin']
  for (const folder of folders.filter(Boolean)) {
    try {
      accessSync(join(folder, name), constants.X_OK)
      return join(folder, name)
    } catch {
      continue
    }
  }
  return null
}

/** Like findProgram, but a missing program is a SetUpError that says how to get it. */
export function needProgram(name: string): string {
  const found = findProgram(name)
  if (found !== null) return found
  throw new SetUpError(
    `MariaDB is missing (no ${name} found). Install it with: ` +
      `${isRoot() ? '' : 'sudo '}apt-get install -y --no-install-recommends mariadb-server-core mariadb-client-core`,
  )
}

/** `--user=root` is demanded by MariaDB when root starts it, and refused to anybody else. */
export const runAsArguments = (): string[] => (isRoot() ? ['--user=root'] : [])

/** Makes the data files once. They appear under their final name only when complete, so a cut-off start leaves none. */
export async function installDataFiles(files: string): Promise<void> {
  if (existsSync(files)) return
  const unfinished = `${files}.new`
  rmSync(unfinished, { recursive: true, force: true })
  mkdirSync(unfinished, { recursive: true, mode: 0o700 })
  await run(needProgram('mariadb-install-db'), [
    '--no-defaults',
    `--datadir=${unfinished}`,
    ...runAsArguments(),
    '--auth-root-authentication-method=socket',
    '--skip-test-db',
    '--skip-name-resolve',
  ]).catch((error: { stderr?: string; message: string }) => {
    throw new SetUpError(`MariaDB could not make its data files: ${(error.stderr || error.message).trim()}`)
  })
  renameSync(unfinished, files)
}

/** The accounts' passwords, drawn at random once and kept readable by the owner only. */
export function loadPasswords(file: string): Record<AccountRole, string> {
  if (!existsSync(file)) {
    const draw = () => randomBytes(24).toString('base64url')
    writeFileSync(file, JSON.stringify({ migrate: draw(), app: draw(), backup: draw() }), { mode: 0o600 })
  }
  return JSON.parse(readFileSync(file, 'utf8')) as Record<AccountRole, string>
}

/**
 * What MariaDB runs before it lets anybody in: the database and the three accounts. MariaDB reads one statement a line.
 * `databases` is a name, or a pattern such as `test\_%` for tests (then no database is made).
 *
 * - migrate: the owner, changes the schema and hands rights to the app account;
 * - app: nothing until grants.ts gives it rights table by table;
 * - backup: reads everything in one consistent pass.
 */
export function accountStatements(databases: string, passwords: Record<AccountRole, string>): string {
  const isPattern = databases.includes('%')
  const user = (role: AccountRole) => `'${accountNames[role]}'@'127.0.0.1'`
  const roles: AccountRole[] = ['migrate', 'app', 'backup']
  return [
    ...(isPattern
      ? []
      : [`CREATE DATABASE IF NOT EXISTS \`${databases}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci;`]),
    ...roles.flatMap((role) => [
      `CREATE USER IF NOT EXISTS ${user(role)};`,
      `ALTER USER ${user(role)} IDENTIFIED BY '${passwords[role]}';`,
    ]),
    `GRANT ALL PRIVILEGES ON \`${databases}\`.* TO ${user('migrate')} WITH GRANT OPTION;`,
    `GRANT SELECT, LOCK TABLES, SHOW VIEW, TRIGGER ON \`${databases}\`.* TO ${user('backup')};`,
    '',
  ].join('\n')
}
