import type { EntityTarget, ObjectLiteral } from 'typeorm'
import type { ConsentPurpose } from '../../shared/consents.ts'
import { isId } from '../../shared/fields.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import type { Viewer } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import { database, type Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { consentHolds, runsAt } from './inForce.ts'
import type { Fragment } from './sql.ts'

/** Consent rows in force at :scopeNow for the child in `column`: given, not expired, not withdrawn (end exclusive). */
export const consentInForce = (column: string, purposes: readonly ConsentPurpose[]): Fragment => ({
  sql: `EXISTS (SELECT 1 FROM consents sc WHERE sc.childId = ${column} AND sc.purpose IN (:scopePurposes)
    AND ${consentHolds('sc', ':scopeNow')})`,
  parameters: { scopePurposes: purposes, scopeNow: now() },
})

const heldByTherapist = (column: string) => `EXISTS (SELECT 1 FROM assignments sa WHERE sa.childId = ${column}
  AND sa.therapistId = :scopeViewer AND ${runsAt('sa', ':scopeNow')})`

/** Conditions for a row of `guardians` to count as the viewer's own link now; parameters as of `childScope`. */
export const ownLink = (row: string) => `${row}.userId = :scopeViewer AND ${row}.restricted = 0
  AND ${row}.verifiedAt <= :scopeNow AND (${row}.endedAt IS NULL OR ${row}.endedAt > :scopeNow)`

/** Years at which a young person's record stops being open to those who cared for them. */
export const ageOfMajority = 18

/** Is the viewer a carer of this child to whom its record was closed? */
export const restrictedFrom = (column: string): string =>
  `EXISTS (SELECT 1 FROM guardians sr WHERE sr.childId = ${column}
    AND sr.userId = :scopeViewer AND sr.restricted = 1)`

// A restriction on one link closes every other link of the same person to the child.
const linkedGuardian = (column: string) => `(EXISTS (SELECT 1 FROM guardians sg
    JOIN children sy ON sy.id = sg.childId WHERE sg.childId = ${column} AND ${ownLink('sg')}
    AND (sg.relation = 'self' OR sy.birthDate > DATE_SUB(DATE(:scopeNow), INTERVAL ${ageOfMajority} YEAR)))
  AND NOT ${restrictedFrom(column)})`

/** People meet their own child as family only, never as the child's teacher. */
const notFamily = (column: string) => `NOT EXISTS (SELECT 1 FROM guardians so WHERE so.childId = ${column}
  AND ${ownLink('so')}) AND NOT ${restrictedFrom(column)}`

const taughtNow = (column: string) => `EXISTS (SELECT 1 FROM children st
  JOIN class_teachers sct ON sct.schoolClassId = st.schoolClassId
  WHERE st.id = ${column} AND sct.teacherId = :scopeViewer AND ${runsAt('sct', ':scopeNow')})`

/** School purposes that make a child known to the teacher at all. */
export const schoolPurposes: readonly ConsentPurpose[] = [
  'share_school_seating',
  'share_school_goals',
  'share_school_samples',
  'share_school_observation',
]

/**
 * Condition that keeps rows to children to whom the viewer stands in this relation now.
 * It belongs into every query on a child's data, so that nothing is loaded first and compared later.
 */
export const childScope = (viewer: Viewer, relation: ChildRelation, column: string): Fragment => {
  const parameters = { scopeViewer: viewer.id, scopeNow: now() }
  const holds = (role: (typeof viewer.roles)[number]) => viewer.roles.includes(role)
  switch (relation) {
    case 'guardian':
      return { sql: linkedGuardian(column), parameters }
    case 'assignedTherapist':
      return holds('therapist') ? { sql: heldByTherapist(column), parameters } : nobody
    case 'clinicLead':
      return holds('clinicLead') ? everyChild : nobody
    case 'administrator':
      return holds('administrator') ? everyChild : nobody
    case 'teacher': {
      const consent = consentInForce(column, schoolPurposes)
      return holds('teacher')
        ? {
            sql: `(${taughtNow(column)} AND ${consent.sql} AND ${notFamily(column)})`,
            parameters: { ...consent.parameters, ...parameters },
          }
        : nobody
    }
  }
}

const everyChild: Fragment = { sql: '1 = 1', parameters: {} }
const nobody: Fragment = { sql: '1 = 0', parameters: {} }

/** The scope of an access that was found already, for the queries that follow it. */
export const within = (access: ChildAccess, column: string): Fragment => {
  const scope = childScope(access.viewer, access.relation, column)
  return {
    sql: `${column} = :scopeChild AND ${scope.sql}`,
    parameters: { ...scope.parameters, scopeChild: access.childId },
  }
}

/**
 * Loads one entity of this child for writing, under the viewer's scope.
 * `lock` takes the row FOR UPDATE inside the transaction. Absent or not theirs: the same 404.
 */
export const findForChild = async <E extends ObjectLiteral>(
  access: ChildAccess,
  target: EntityTarget<E>,
  id: string,
  tx?: Tx,
  options: { lock?: boolean } = {},
): Promise<E> => {
  if (!isId(id)) throw notFound()
  const scope = within(access, 'row.childId')
  const query = (tx ?? database().manager)
    .createQueryBuilder(target, 'row')
    .where('row.id = :rowId', { rowId: id })
    .andWhere(scope.sql.replace(/:scopePurposes/g, ':...scopePurposes'), scope.parameters)
  if (options.lock) query.setLock('pessimistic_write')
  const found = await query.getOne()
  if (!found) throw notFound()
  return found
}
