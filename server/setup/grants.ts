import { createConnection } from 'mysql2/promise'
import { connectionOptions, type DatabaseAccess } from './databaseAccess.ts'
import { deletableTables, updatableTables } from './tableRights.ts'

/** A TypeORM data source or query runner: anything that runs SQL and answers with rows. */
export type SqlRunner = { query: (sql: string, parameters?: unknown[]) => Promise<unknown> }

/** Kept by TypeORM itself; the app account reads it at boot to see whether a migration is pending. */
const migrationsTable = 'migrations'

const rowRights = ['SELECT', 'INSERT', 'UPDATE', 'DELETE'] as const
type RowRight = (typeof rowRights)[number]

export type TableRights = { updatable: readonly string[]; deletable: readonly string[] }
const productRights: TableRights = { updatable: updatableTables, deletable: deletableTables }

/** What the app account may do with the rows of a table, and nothing else. */
function rightsOn(table: string, { updatable, deletable }: TableRights): RowRight[] {
  if (table === migrationsTable) return ['SELECT']
  return [
    'SELECT',
    'INSERT',
    ...(updatable.includes(table) ? (['UPDATE'] as const) : []),
    ...(deletable.includes(table) ? (['DELETE'] as const) : []),
  ]
}

/** The account as MariaDB knows it, `user@host`, found by signing in with it. It needs no right on any database. */
export async function accountOf(access: DatabaseAccess): Promise<string> {
  const { database: _, ...server } = connectionOptions(access)
  const connection = await createConnection(server)
  try {
    const [rows] = await connection.query('SELECT CURRENT_USER() AS account')
    return (rows as { account: string }[])[0]?.account ?? ''
  } finally {
    await connection.end()
  }
}

/**
 * Gives the app account its rights on every table of the database and takes back those no longer listed in
 * tableRights.ts. Run it as the owner (migrate account) after the migrations, at every start.
 * `appAccount` is `user@host` (see accountOf). Throws when tableRights.ts names a table that does not exist, so that a
 * misspelt name cannot pass for a right withheld.
 */
export async function applyGrants(
  owner: SqlRunner,
  database: string,
  appAccount: string,
  rights: TableRights = productRights,
): Promise<void> {
  const tables = await tablesOf(owner, database)
  const unknown = [...new Set([...rights.updatable, ...rights.deletable])].filter(
    (name) => !tables.includes(name),
  )
  if (unknown.length > 0)
    throw new Error(`tableRights.ts names no table of the schema: ${unknown.join(', ')}`)
  const at = appAccount.lastIndexOf('@')
  const account = `${quoteText(appAccount.slice(0, at))}@${quoteText(appAccount.slice(at + 1))}`
  for (const table of tables) {
    const given = rightsOn(table, rights)
    const taken = [...rowRights.filter((right) => !given.includes(right)), ...schemaRights]
    const target = `${quoteName(database)}.${quoteName(table)}`
    // First given, then taken: the grant makes the entry that a revoke insists on, and no right is missing in between.
    await owner.query(`GRANT ${given.join(', ')} ON ${target} TO ${account}`)
    await owner.query(`REVOKE ${taken.join(', ')} ON ${target} FROM ${account}`)
  }
}

/** Rights that reach beyond rows; the app account has none of them. */
const schemaRights = ['CREATE', 'DROP', 'ALTER', 'INDEX', 'REFERENCES', 'TRIGGER', 'CREATE VIEW', 'SHOW VIEW']

/**
 * For the check at boot: in which points the rights of the signed-in app account differ from what they should be.
 * An empty list means all is well. Covers rights on single tables, on whole databases and on the server.
 */
export async function findRightsProblems(
  app: SqlRunner,
  database: string,
  rights: TableRights = productRights,
): Promise<string[]> {
  const ofThisAccount = `REPLACE(GRANTEE, '''', '') = CURRENT_USER()`
  const wide = (await app.query(
    `SELECT PRIVILEGE_TYPE AS name, 'every table' AS place FROM information_schema.SCHEMA_PRIVILEGES
      WHERE ${ofThisAccount} AND ? LIKE TABLE_SCHEMA
     UNION ALL
     SELECT PRIVILEGE_TYPE, 'the whole server' FROM information_schema.USER_PRIVILEGES
      WHERE ${ofThisAccount} AND PRIVILEGE_TYPE <> 'USAGE'`,
    [database],
  )) as { name: string; place: string }[]
  const narrow = (await app.query(
    `SELECT TABLE_NAME AS place, PRIVILEGE_TYPE AS name FROM information_schema.TABLE_PRIVILEGES
      WHERE ${ofThisAccount} AND TABLE_SCHEMA = ?`,
    [database],
  )) as { name: string; place: string }[]

  const problems = wide.map(({ name, place }) => `the app account must not have ${name} on ${place}`)
  for (const table of await tablesOf(app, database)) {
    const actual = narrow.filter((right) => right.place === table).map((right) => right.name)
    const wanted: string[] = rightsOn(table, rights)
    problems.push(
      ...wanted
        .filter((name) => !actual.includes(name))
        .map((name) => `the app account lacks ${name} on ${table}`),
      ...actual
        .filter((name) => !wanted.includes(name))
        .map((name) => `the app account must not have ${name} on ${table}`),
    )
  }
  return problems
}

async function tablesOf(runner: SqlRunner, database: string): Promise<string[]> {
  const rows = (await runner.query(
    `SELECT TABLE_NAME AS name FROM information_schema.TABLES
      WHERE TABLE_SCHEMA = ? AND TABLE_TYPE = 'BASE TABLE' ORDER BY TABLE_NAME`,
    [database],
  )) as { name: string }[]
  return rows.map((row) => row.name)
}

const quoteName = (name: string) => `\`${name.replaceAll('`', '``')}\``
const quoteText = (text: string) => `'${text.replaceAll('\\', '\\\\').replaceAll("'", "''")}'`
