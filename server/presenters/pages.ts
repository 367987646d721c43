import type { Page } from '../../shared/pages.ts'

/** A page of a list as it leaves the server. */
export const presentPage = <Stored, Shown>(
  { rows, total }: { rows: readonly Stored[]; total: number },
  { page, size }: { page: number; size: number },
  present: (row: Stored) => Shown,
): Page<Shown> => ({ rows: rows.map(present), total, page, size })
