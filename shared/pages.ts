/** One page of a list, counted on the server. `page` starts at 1. */
export interface Page<Row> {
  rows: Row[]
  total: number
  page: number
  size: number
}

export const defaultPageSize = 25
export const maximumPageSize = 100
