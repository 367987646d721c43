import type { ChildAccess } from '../access/childAccess.ts'
import type { ChildRelation, Role } from '../../shared/roles.ts'

/** `read` and `write` must leave an audit entry; `none` is for answers without identifiable data. */
export type AuditDuty = 'read' | 'write' | 'none'

/** Open to everybody; the reason is part of the declaration. */
export interface OpenPolicy {
  kind: 'open'
  name: string
  reason: string
  audit: AuditDuty
}

/** For holders of at least one role; others get 403. */
export interface RolePolicy {
  kind: 'role'
  name: string
  roles: readonly Role[]
  audit: AuditDuty
}

/**
 * For people in one of the relations to the child in the address. Everybody else gets the 404 of an absent id,
 * except `refused`: those may know the child but not do this, and get 403.
 */
export interface ChildPolicy {
  kind: 'child'
  name: string
  relations: readonly ChildRelation[]
  refused: readonly ChildRelation[]
  audit: AuditDuty
}

export type Policy = OpenPolicy | RolePolicy | ChildPolicy

export const openPolicy = (name: string, reason: string, audit: AuditDuty = 'none'): OpenPolicy => ({
  kind: 'open',
  name,
  reason,
  audit,
})

export const rolePolicy = (name: string, roles: readonly Role[], audit: AuditDuty): RolePolicy => ({
  kind: 'role',
  name,
  roles,
  audit,
})

export const childPolicy = (
  name: string,
  relations: readonly ChildRelation[],
  audit: AuditDuty,
  refused: readonly ChildRelation[] = [],
): ChildPolicy => ({ kind: 'child', name, relations, audit, refused })

export const isRelation = (access: ChildAccess, ...relations: ChildRelation[]) =>
  relations.includes(access.relation)
