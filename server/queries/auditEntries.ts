import type { ChildRelation } from '../../shared/roles.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { selectPage, type PageOf, type PageSlice } from './pages.ts'
import { within } from './scope.ts'

export interface AccessRow {
  id: string
  at: Date
  actorId: string | null
  actor: string | null
  relation: ChildRelation | null
  action: string
  result: 'allowed' | 'denied'
}

/**
 * Who opened or changed this child's record, the newest first. A carer sees what staff and the school did and what they
 * did themselves; another carer's doings, and that something was kept from them, are not read.
 */
export const listAccess = (access: ChildAccess, slice: PageSlice): Promise<PageOf<AccessRow>> => {
  const scope = within(access, 'x.childId')
  const asCarer = `AND x.result = 'allowed' AND (x.actorId = :viewer OR x.relation IS NULL OR x.relation <> 'guardian')
    AND (x.objectType IS NULL OR x.objectType <> 'guardian' OR x.objectId <=> :ownRow)`
  return selectPage<AccessRow>(
    {
      select: 'x.id, x.at, x.actorId, u.displayName AS actor, x.relation, x.action, x.result',
      from: `FROM audit_entries x LEFT JOIN users u ON u.id = x.actorId
        WHERE ${scope.sql} ${access.relation === 'guardian' ? asCarer : ''}`,
      orderBy: 'x.at DESC, x.id DESC',
      parameters: { ...scope.parameters, viewer: access.viewer.id, ownRow: access.guardianId },
    },
    slice,
  )
}
