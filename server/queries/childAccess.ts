import type { ConsentPurpose } from '../../shared/consents.ts'
import { childRelations, type ChildRelation } from '../../shared/roles.ts'
import { isId } from '../../shared/fields.ts'
import type { Viewer } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import { consentHolds } from './inForce.ts'
import { childScope, ownLink, restrictedFrom, schoolPurposes } from './scope.ts'
import { flag, selectOne, type SqlParameters } from './sql.ts'

type RelationRow = Record<ChildRelation, number> & {
  guardianId: string | null
  blocked: number
  scopes: string | null
}

/**
 * How the viewer stands to the child, in one query; null when in no way (or when there is no such child).
 * The nearest relation wins: a person's own child is never treated through their staff role, and a restriction on a
 * guardian beats every other grant.
 */
export const findChildAccess = async (viewer: Viewer, childId: string): Promise<ChildAccess | null> => {
  if (!isId(childId)) return null
  const scopes = childRelations.map((relation) => ({ relation, ...childScope(viewer, relation, 'c.id') }))
  const parameters: SqlParameters = Object.assign({}, ...scopes.map((scope) => scope.parameters), {
    childId,
    now: now(),
    purposes: schoolPurposes,
  })
  const row = await selectOne<RelationRow>(
    `SELECT ${scopes.map(({ relation, sql }) => `(${sql}) AS \`${relation}\``).join(', ')},
       (SELECT g.id FROM guardians g WHERE g.childId = c.id AND ${ownLink('g')}
         ORDER BY g.createdAt LIMIT 1) AS guardianId,
       ${restrictedFrom('c.id')} AS blocked,
       (SELECT GROUP_CONCAT(DISTINCT f.purpose) FROM consents f WHERE f.childId = c.id
         AND f.purpose IN (:purposes) AND ${consentHolds('f')}) AS scopes
     FROM children c WHERE c.id = :childId`,
    parameters,
  )
  if (!row || flag(row.blocked)) return null
  const relation = childRelations.find((candidate) => flag(row[candidate]))
  if (!relation) return null
  return {
    childId,
    viewer,
    relation,
    guardianId: relation === 'guardian' ? row.guardianId : null,
    schoolScopes: relation === 'teacher' && row.scopes ? (row.scopes.split(',') as ConsentPurpose[]) : [],
  }
}
