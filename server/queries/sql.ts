import { database, type Tx } from '../dataSource.ts'

export type SqlValue = string | number | boolean | Date | Buffer | null | readonly (string | number)[]
export type SqlParameters = Record<string, SqlValue>

/** A piece of SQL with its named parameters (`:name`). Only our own text is ever in `sql`. */
export interface Fragment {
  sql: string
  parameters: SqlParameters
}

const isPlain = (value: SqlValue): boolean =>
  value === null ||
  ['string', 'number', 'boolean'].includes(typeof value) ||
  value instanceof Date ||
  Buffer.isBuffer(value) ||
  (Array.isArray(value) &&
    value.length > 0 &&
    value.every((part) => ['string', 'number'].includes(typeof part)))

/** Turns `:name` into `?`; an object as a value would be expanded into SQL by the driver, so it is refused. */
const positional = (sql: string, parameters: SqlParameters): [string, SqlValue[]] => {
  const values: SqlValue[] = []
  const text = sql.replace(/:([a-zA-Z]\w*)/g, (_, name: string) => {
    const value = parameters[name]
    if (value === undefined || !isPlain(value))
      throw new Error(`SQL parameter ${name} is missing or not a plain value`)
    values.push(value)
    return '?'
  })
  return [text, values]
}

/**
 * Reads projections. Column types as the driver gives them: DATE → 'YYYY-MM-DD', DATETIME → Date (UTC),
 * BOOLEAN → 0/1 (see `flag`), JSON → text (see `fromJson`), COUNT and DECIMAL → text (see `count`).
 */
export const selectRows = async <Row>(
  sql: string,
  parameters: SqlParameters = {},
  tx?: Tx,
): Promise<Row[]> => {
  const [text, values] = positional(sql, parameters)
  return (tx ?? database()).query(text, values)
}

export const selectOne = async <Row>(
  sql: string,
  parameters: SqlParameters = {},
  tx?: Tx,
): Promise<Row | null> => {
  const [row] = await selectRows<Row>(sql, parameters, tx)
  return row ?? null
}

/** Runs a writing statement and answers how many rows it touched. */
export const execute = async (tx: Tx, sql: string, parameters: SqlParameters = {}): Promise<number> => {
  const [text, values] = positional(sql, parameters)
  const result: { affectedRows: number } = await tx.query(text, values)
  return result.affectedRows
}

export const flag = (value: number | string | boolean): boolean => Number(value) === 1

export const count = (value: string | number): number => Number(value)

export const fromJson = <T>(value: string | T): T =>
  typeof value === 'string' ? (JSON.parse(value) as T) : value

/** A search word for LIKE with its wildcards taken literally. */
export const likePattern = (word: string): string => `%${word.replace(/[\\%_]/g, (sign) => `\\${sign}`)}%`
