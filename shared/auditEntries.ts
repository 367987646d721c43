import type { Page } from './pages.ts'

/** Who opened or changed a child's record, for people. */
export interface AccessEntry {
  id: string
  at: string
  who: string
  relation: string
  action: string
  result: 'allowed' | 'denied'
}
export type AccessPage = Page<AccessEntry>
