import { perGuardianPurposes, type ConsentPurpose } from '../../shared/consents.ts'
import type { Day } from '../../shared/days.ts'
import type { GoalDetails } from '../../shared/goals.ts'
import type { GuardianRelation, ParentalResponsibility } from '../../shared/guardians.ts'
import type { Viewer } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { therapistName } from './currentTherapist.ts'
import { consentHolds } from './inForce.ts'
import { calledName } from './names.ts'
import { unreadLetters } from './receivedLetters.ts'
import { childScope, ownLink, within } from './scope.ts'
import { count, flag, fromJson, selectOne, selectRows } from './sql.ts'

export interface OwnChildRow {
  id: string
  name: string
  therapist: string | null
  unreadLetters: number
}

/** The children to whom the viewer stands as a carer now. */
export const listOwnChildren = async (viewer: Viewer): Promise<OwnChildRow[]> => {
  const scope = childScope(viewer, 'guardian', 'c.id')
  const therapist = therapistName('c.id')
  const rows = await selectRows<Omit<OwnChildRow, 'unreadLetters'> & { unreadLetters: string }>(
    `SELECT c.id, ${calledName('c')} AS name, ${therapist.sql} AS therapist, ${unreadLetters('c.id')} AS unreadLetters
     FROM children c WHERE ${scope.sql} ORDER BY name, c.id`,
    { ...scope.parameters, ...therapist.parameters },
  )
  return rows.map((row) => ({ ...row, unreadLetters: count(row.unreadLetters) }))
}

export interface OwnChildRecord {
  id: string
  name: string
  birthDate: Day
  school: string | null
  therapist: string | null
  consentsForSelf: boolean
  /** The viewer's own row: nobody else's is ever loaded here. */
  guardianId: string
  guardianName: string
  relation: GuardianRelation
  parentalResponsibility: ParentalResponsibility
  email: string | null
  phone: string | null
  address: string | null
  version: number
}

/** The child with the viewer's own contact row. */
export const findOwnChild = async (access: ChildAccess, tx?: Tx): Promise<OwnChildRecord> => {
  if (access.guardianId === null) throw notFound()
  const scope = within(access, 'c.id')
  const therapist = therapistName('c.id')
  const row = await selectOne<Omit<OwnChildRecord, 'consentsForSelf'> & { consentsForSelf: number }>(
    `SELECT c.id, ${calledName('c')} AS name, c.birthDate, s.name AS school, ${therapist.sql} AS therapist,
       c.consentsForSelf, g.id AS guardianId, g.name AS guardianName, g.relation, g.parentalResponsibility, g.email,
       g.phone, g.address, g.version
     FROM children c JOIN guardians g ON g.childId = c.id AND g.id = :ownRow AND ${ownLink('g')}
       LEFT JOIN school_classes k ON k.id = c.schoolClassId LEFT JOIN schools s ON s.id = k.schoolId
     WHERE ${scope.sql}`,
    { ownRow: access.guardianId, ...scope.parameters, ...therapist.parameters },
    tx,
  )
  if (!row) throw notFound()
  return { ...row, consentsForSelf: flag(row.consentsForSelf) }
}

export interface ConsentInForceRow {
  id: string
  purpose: ConsentPurpose
  guardianId: string | null
  givenByName: string
  at: Date
}

/** Consents in force that concern this carer: theirs, and those for the child. Another carer's e-mail choice is not read. */
export const listConsentsInForce = (access: ChildAccess, tx?: Tx): Promise<ConsentInForceRow[]> => {
  const scope = within(access, 'f.childId')
  return selectRows<ConsentInForceRow>(
    `SELECT f.id, f.purpose, f.guardianId, f.givenByName, f.at FROM consents f
     WHERE ${scope.sql} AND ${consentHolds('f')}
       AND (f.purpose NOT IN (:perGuardian) OR f.guardianId = :ownRow)
     ORDER BY f.at DESC, f.id`,
    { ...scope.parameters, now: now(), perGuardian: perGuardianPurposes, ownRow: access.guardianId },
    tx,
  )
}

/** What the child said they want, of goals still open. */
export const listGoalWords = async (access: ChildAccess): Promise<string[]> => {
  const scope = within(access, 'g.childId')
  const rows = await selectRows<{ details: string }>(
    `SELECT g.details FROM goals g WHERE g.endedOn IS NULL AND ${scope.sql} ORDER BY g.setOn, g.createdAt, g.id`,
    scope.parameters,
  )
  return rows.map((row) => fromJson<GoalDetails>(row.details).childVoice)
}
