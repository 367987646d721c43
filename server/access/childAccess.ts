import type { ConsentPurpose } from '../../shared/consents.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import type { Viewer } from './actor.ts'

/** How one viewer stands to one child now. Rights follow from `relation` alone, never from a union of roles. */
export interface ChildAccess {
  childId: string
  viewer: Viewer
  relation: ChildRelation
  /** The viewer's own guardian row, when the relation is guardian. */
  guardianId: string | null
  /** School scopes in force, when the relation is teacher. */
  schoolScopes: readonly ConsentPurpose[]
}
