import type { DataSource } from 'typeorm'
import { guardNames } from '../migrations/1764547300000-CloseWhatIsClosed.ts'
import { assessmentGuardNames } from '../migrations/1764580000000-AddAssessment.ts'
import { findRightsProblems } from './grants.ts'

/** Three times the largest upload, for the driver sends binary data as hexadecimal text. */
const smallestPacket = 30 * 1024 * 1024

interface Variables {
  sqlMode: string
  characterSet: string
  packet: string
  statementTime: string
}

/**
 * What the boot insists on, in words; empty when all is well: strict SQL mode, utf8mb4, packet size, time limit,
 * migrations, triggers, RESTRICT keys and the exact rights of the app account.
 */
export const databaseProblems = async (app: DataSource): Promise<string[]> => {
  const problems: string[] = []
  const [variables] = (await app.query(
    `SELECT @@SESSION.sql_mode AS sqlMode, @@character_set_database AS characterSet,
       @@max_allowed_packet AS packet, @@SESSION.max_statement_time AS statementTime`,
  )) as Variables[]
  if (
    !variables?.sqlMode.includes('STRICT_ALL_TABLES') &&
    !variables?.sqlMode.includes('STRICT_TRANS_TABLES')
  )
    problems.push('the SQL mode is not strict')
  if (variables?.characterSet !== 'utf8mb4') problems.push('the character set of the database is not utf8mb4')
  if (Number(variables?.packet) < smallestPacket)
    problems.push(`max_allowed_packet is below ${smallestPacket} bytes`)
  if (Number(variables?.statementTime) === 0)
    problems.push('statements have no time limit (max_statement_time)')

  if (await app.showMigrations()) {
    problems.push('a migration is pending: start with DATABASE_MIGRATE_URL, or run it as the owner')
    return problems
  }
  const triggers = (await app.query('SELECT name FROM guard_names')) as { name: string }[]
  for (const name of [...guardNames, ...assessmentGuardNames])
    if (!triggers.some((trigger) => trigger.name === name)) problems.push(`the trigger ${name} is missing`)

  const loose = (await app.query('SELECT name FROM passing_keys')) as { name: string }[]
  problems.push(...loose.map(({ name }) => `the key ${name} passes changes on; it must be RESTRICT`))
  problems.push(...(await findRightsProblems(app, app.options.database as string)))
  return problems
}
