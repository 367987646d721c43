import type { Day } from './days.ts'

/** One measure on the lateral line, −100 (left) … +100 (right). */
export interface LateralLineRow {
  id: string
  /** E.g. 'Hand-use questionnaire'. */
  measure: string
  occasion: Day
  /** Null when the measure could not be scored. */
  value: number | null
  interval: { low: number; high: number } | null
  /** How much the value rests on, e.g. '9 of 10 activities answered'. */
  basis: string
  /** E.g. 'Provisional: fewer than 8 answered'. Null when nothing qualifies the value. */
  caution: string | null
  /** Published or clinic cut-offs drawn as faint bands; `inclusive` as in `CutOffSet`. */
  cutOffs: { name: string; left: number; right: number; inclusive: boolean } | null
  informant: string | null
  /** True for the newest occasion of its measure; earlier ones are drawn lighter. */
  latest: boolean
}
