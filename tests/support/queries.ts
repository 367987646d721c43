import { database } from '../../server/dataSource.ts'

interface Connection {
  query: (...given: unknown[]) => unknown
}
interface Pool {
  getConnection: (use: (error: unknown, connection: Connection) => void) => void
}

const watched = new WeakSet<Connection>()
let heard: string[] | null = null

const textOf = (first: unknown): string =>
  typeof first === 'string' ? first : String((first as { sql?: unknown }).sql)

/** Every statement that reaches MariaDB through the app's pool while the work runs, in order. */
export const statementsOf = async (work: () => Promise<unknown>): Promise<string[]> => {
  const { pool } = database().driver as unknown as { pool: Pool }
  const getConnection = pool.getConnection.bind(pool)
  pool.getConnection = (use) =>
    getConnection((error, connection) => {
      if (connection && !watched.has(connection)) {
        watched.add(connection)
        const query = connection.query.bind(connection)
        connection.query = (...given) => {
          heard?.push(textOf(given[0]).replace(/\s+/g, ' ').trim())
          return query(...given)
        }
      }
      use(error, connection)
    })
  const statements: string[] = []
  heard = statements
  try {
    await work()
  } finally {
    heard = null
    pool.getConnection = getConnection
  }
  return statements
}

/** What the audit trail does on its own, in groups, for all requests of a moment together. */
const isAudit = (statement: string) =>
  /audit_(heads|entries)/.test(statement) || /^(START TRANSACTION|COMMIT)$/.test(statement)

/** The questions a page asks: every SELECT but those of the audit trail. */
export const questionsIn = (statements: readonly string[]): string[] =>
  statements.filter((statement) => /^(SELECT|WITH)\b/i.test(statement) && !isAudit(statement))

/** Statements that are neither questions nor audit. */
export const othersIn = (statements: readonly string[]): string[] =>
  statements.filter((statement) => !/^(SELECT|WITH)\b/i.test(statement) && !isAudit(statement))
