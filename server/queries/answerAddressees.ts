import type { AnswererKind, RequestedForm } from '../../shared/answerRequests.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import type { CarerStanding, RequestStanding } from '../policies/answerRequests.ts'
import { agreed, comesOfAge, ended, restricted, stillOpen, withPeople } from './answerRequests.ts'
import { runsAt } from './inForce.ts'
import { within } from './scope.ts'
import { flag, selectOne, selectRows } from './sql.ts'

const signsIn =
  '(u.id IS NOT NULL AND u.disabledAt IS NULL AND u.passwordHash IS NOT NULL AND g.verifiedAt <= :scopeNow)'
const verified = `(u.id IS NOT NULL AND g.verifiedAt IS NOT NULL AND g.verifiedAt <= :scopeNow
  AND COALESCE(g.email, u.email) = u.email)`
const carerColumns = `${restricted} AS restricted, ${ended} AS ended, g.safeToContact, ${comesOfAge} AS childOfAge,
  COALESCE(g.email, u.email) AS email, ${signsIn} AS signsIn`

type CarerFlags = Omit<CarerStanding, 'email'>
type StoredCarer = Record<keyof CarerFlags, number> & { email: string | null }
const toCarer = (row: StoredCarer): CarerStanding => ({
  restricted: flag(row.restricted),
  ended: flag(row.ended),
  safeToContact: flag(row.safeToContact),
  childOfAge: flag(row.childOfAge),
  email: row.email,
  signsIn: flag(row.signsIn),
})

export interface CarerToAsk extends CarerStanding {
  id: string
  name: string
  /** Known with a sign-in of their own, at this very address. */
  verified: boolean
}

/** The child's carers and how each stands to being asked; ended links are left out. */
export const listCarersToAsk = async (access: ChildAccess, tx?: Tx): Promise<CarerToAsk[]> => {
  const scope = within(access, 'g.childId')
  const rows = await selectRows<StoredCarer & { id: string; name: string; verified: number }>(
    `SELECT g.id, g.name, ${verified} AS verified, ${carerColumns}
     FROM guardians g JOIN children c ON c.id = g.childId
       LEFT JOIN users u ON u.id = g.userId
     WHERE ${scope.sql} AND NOT ${ended} ORDER BY g.createdAt, g.id`,
    { ...scope.parameters, scopeNow: now() },
    tx,
  )
  return rows.map((row) => ({ id: row.id, name: row.name, verified: flag(row.verified), ...toCarer(row) }))
}

// People meet their own child as family only, never as the child's teacher.
const teachesNow = (teacher: string) => `EXISTS (SELECT 1 FROM class_teachers ct
  WHERE ct.schoolClassId = c.schoolClassId AND ct.teacherId = ${teacher} AND ${runsAt('ct', ':scopeNow')})
  AND NOT EXISTS (SELECT 1 FROM guardians tg WHERE tg.childId = c.id AND tg.userId = ${teacher})`
const activeTeacher = (row: string) =>
  `${row}.disabledAt IS NULL AND JSON_CONTAINS(${row}.roles, '"teacher"')`

export interface TeacherToAsk {
  id: string
  name: string
  email: string
}

/** Who teaches the child's class now, with an account in use. */
export const listTeachersToAsk = (access: ChildAccess, tx?: Tx): Promise<TeacherToAsk[]> => {
  const scope = within(access, 'c.id')
  return selectRows<TeacherToAsk>(
    `SELECT u.id, u.displayName AS name, u.email FROM children c JOIN users u ON ${activeTeacher('u')}
     WHERE ${scope.sql} AND ${teachesNow('u.id')} ORDER BY u.displayName, u.id`,
    { ...scope.parameters, scopeNow: now() },
    tx,
  )
}

/** A request as far as writing about it goes, for the jobs that send e-mails. */
export interface RequestToWriteAbout extends RequestStanding {
  id: string
  childId: string
  asks: RequestedForm
  classId: string | null
  email: string | null
  askedAt: Date
  expiresAt: Date
  remindedAt: Date | null
  savedAt: Date | null
  mailId: string | null
  version: number
}

type StoredRequest = StoredCarer &
  Pick<
    RequestToWriteAbout,
    | 'id'
    | 'childId'
    | 'asks'
    | 'classId'
    | 'askedAt'
    | 'expiresAt'
    | 'remindedAt'
    | 'savedAt'
    | 'mailId'
    | 'version'
  > & {
    answerer: AnswererKind
    teacherEmail: string | null
    byLink: number
    isOver: number
    treatmentConsent: number
    observationConsent: number
    teaches: number | null
  }

/** What may be written, to whom, judged now. `by` names the request or the e-mail about it. */
export const findRequestToWriteAbout = async (
  by: { id: string } | { mailId: string },
  tx?: Tx,
): Promise<RequestToWriteAbout | null> => {
  const row = await selectOne<StoredRequest>(
    `SELECT r.id, r.childId, r.asks, c.schoolClassId AS classId, r.askedAt, r.expiresAt, r.remindedAt, r.savedAt,
       r.mailId, r.version, r.answerer, r.tokenHash IS NOT NULL AS byLink, NOT (${stillOpen('r')}) AS isOver,
       ${agreed('assessment_treatment')} AS treatmentConsent, ${agreed('share_school_observation')} AS observationConsent,
       t.email AS teacherEmail, (${activeTeacher('t')} AND ${teachesNow('t.id')}) AS teaches, ${carerColumns}
     FROM answer_requests r ${withPeople} LEFT JOIN users u ON u.id = g.userId
     WHERE ${'id' in by ? 'r.id' : 'r.mailId'} = :value`,
    { value: 'id' in by ? by.id : by.mailId, scopeNow: now() },
    tx,
  )
  if (!row) return null
  const carer = row.answerer === 'guardian' ? toCarer(row) : null
  return {
    id: row.id,
    childId: row.childId,
    asks: row.asks,
    classId: row.classId,
    email: carer ? carer.email : row.teacherEmail,
    askedAt: row.askedAt,
    expiresAt: row.expiresAt,
    remindedAt: row.remindedAt,
    savedAt: row.savedAt,
    mailId: row.mailId,
    version: row.version,
    answerer: row.answerer,
    byLink: flag(row.byLink),
    over: flag(row.isOver),
    treatmentConsent: flag(row.treatmentConsent),
    observationConsent: flag(row.observationConsent),
    carer,
    teaches: row.teaches !== null && flag(row.teaches),
  }
}

/** Requests whose reminder may be due: open, asked so long ago, and not reminded since. */
export const listReminderCandidates = (askedBefore: Date, remindedBefore: Date): Promise<{ id: string }[]> =>
  selectRows<{ id: string }>(
    `SELECT r.id FROM answer_requests r WHERE ${stillOpen('r')} AND r.askedAt <= :askedBefore
       AND (r.remindedAt IS NULL OR r.remindedAt <= :remindedBefore) ORDER BY r.askedAt, r.id`,
    { scopeNow: now(), askedBefore, remindedBefore },
  )
