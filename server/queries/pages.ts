import { count, selectOne, selectRows, type SqlParameters } from './sql.ts'

/** Which part of a list is wanted; `middleware/requestBody.ts` reads it from the address. */
export interface PageSlice {
  size: number
  offset: number
}

export interface PageOf<Row> {
  rows: Row[]
  total: number
}

interface ListSql {
  /** Columns, without SELECT. */
  select: string
  /** FROM, JOIN and WHERE. */
  from: string
  /** From an allow-list, ending in a unique column so that the order is stable. */
  orderBy: string
  parameters: SqlParameters
}

/**
 * One page of a list and the size of the whole, in one query. A page past the end has no row to carry the count, so
 * only then the list is counted again.
 */
export const selectPage = async <Row>(list: ListSql, slice: PageSlice): Promise<PageOf<Row>> => {
  const { select, from, orderBy, parameters } = list
  const rows = await selectRows<Row & { total: string }>(
    `SELECT ${select}, COUNT(*) OVER () AS total ${from} ORDER BY ${orderBy} LIMIT :pageSize OFFSET :pageOffset`,
    { ...parameters, pageSize: slice.size, pageOffset: slice.offset },
  )
  const [first] = rows
  if (first) return { rows, total: count(first.total) }
  if (slice.offset === 0) return { rows, total: 0 }
  const counted = await selectOne<{ total: string }>(`SELECT COUNT(*) AS total ${from}`, parameters)
  return { rows, total: counted ? count(counted.total) : 0 }
}
