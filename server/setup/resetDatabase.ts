// npm run db:reset: deletes the private database; the next start makes it anew (and seeds the demo, if it is on).
import { existsSync, readFileSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { createInterface } from 'node:readline/promises'
import { readEnv } from '../env.ts'
import { livingProcess } from './processes.ts'
import { SetUpError } from './setUpError.ts'

async function resetDatabase(): Promise<string> {
  const env = readEnv({ ...process.env, NODE_ENV: process.env.NODE_ENV ?? 'development' })
  if (env.database !== null) {
    throw new SetUpError(
      'DATABASE_URL is set: only the private database is reset, never an existing MariaDB.',
    )
  }
  const folder = join(env.dataDir, 'mariadb')
  if (!existsSync(folder)) return `There is no database in ${env.dataDir} yet.`
  const owner = join(folder, 'owner')
  const running = existsSync(owner) ? livingProcess(readFileSync(owner, 'utf8')) : null
  if (running !== null) throw new SetUpError(`Fanflower is running (process ${running}). Stop it first.`)
  if (!process.argv.includes('--yes') && !(await confirmed(folder))) return 'Nothing was deleted.'
  rmSync(folder, { recursive: true, force: true })
  return 'The database is deleted. The next start makes a new one.'
}

async function confirmed(folder: string): Promise<boolean> {
  if (!process.stdin.isTTY) throw new SetUpError('To delete without being asked: npm run db:reset -- --yes')
  const prompt = createInterface({ input: process.stdin, output: process.stdout })
  const answer = await prompt.question(`Delete every record in ${folder}? Type "delete" to go on: `)
  prompt.close()
  return answer.trim() === 'delete'
}

try {
  console.log(await resetDatabase())
} catch (error) {
  if (!(error instanceof SetUpError)) throw error
  console.error(error.message)
  process.exitCode = 1
}
