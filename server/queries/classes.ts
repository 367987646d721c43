import type { WritingHand } from '../../shared/children.ts'
import type { GoalDetails } from '../../shared/goals.ts'
import type { ConsentPurpose } from '../../shared/consents.ts'
import type { ScriptDirection } from '../../shared/referrals.ts'
import { isId } from '../../shared/fields.ts'
import type { Viewer } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { consentHolds, runsAt } from './inForce.ts'
import { calledName } from './names.ts'
import { selectPage, type PageOf, type PageSlice } from './pages.ts'
import { adviceColumns, newestAnswer, type AdviceRow } from './schoolAdvice.ts'
import { childScope, within } from './scope.ts'
import { count, fromJson, selectOne, selectRows, type Fragment } from './sql.ts'

/** Is this one school purpose in force? A teacher's scope alone says only that at least one of them is. */
const shares = (purpose: ConsentPurpose, column: string): Fragment => ({
  sql: `EXISTS (SELECT 1 FROM consents f WHERE f.childId = ${column} AND f.purpose = :sharedPurpose
    AND ${consentHolds('f', ':scopeNow')})`,
  parameters: { sharedPurpose: purpose, scopeNow: now() },
})

const heldNow = runsAt('tn', ':scopeNow')

const taughtByViewer = `EXISTS (SELECT 1 FROM class_teachers tn
  WHERE tn.schoolClassId = k.id AND tn.teacherId = :viewer AND ${heldNow})`

// An answer of a class left behind is not this class's answer: the next teacher is asked anew.
const ofPresentTeachers = `EXISTS (SELECT 1 FROM class_teachers tn JOIN children tc ON tc.schoolClassId = tn.schoolClassId
  WHERE tc.id = a.childId AND tn.teacherId = n.byId AND ${heldNow})`

export interface OwnClassRow {
  id: string
  name: string
  school: string
  schoolYear: number
  sharedPupils: number
  unanswered: number
}

/** Classes the viewer teaches now. Only pupils whose family shares something are counted; the others leave no trace. */
export const listOwnClasses = async (viewer: Viewer): Promise<OwnClassRow[]> => {
  const scope = childScope(viewer, 'teacher', 'c.id')
  const seating = shares('share_school_seating', 'c.id')
  const rows = await selectRows<
    Record<'id' | 'name' | 'school' | 'sharedPupils' | 'unanswered', string> & { schoolYear: number }
  >(
    `SELECT k.id, k.name, s.name AS school, k.schoolYear,
       (SELECT COUNT(*) FROM children c WHERE c.schoolClassId = k.id AND ${scope.sql}) AS sharedPupils,
       (SELECT COUNT(*) FROM children c JOIN school_advice a ON a.childId = c.id AND a.endedAt IS NULL
          ${newestAnswer(ofPresentTeachers)}
        WHERE c.schoolClassId = k.id AND r.id IS NULL AND ${seating.sql} AND ${scope.sql}) AS unanswered
     FROM school_classes k JOIN schools s ON s.id = k.schoolId
     WHERE ${taughtByViewer} ORDER BY k.schoolYear DESC, k.name, k.id`,
    { ...scope.parameters, ...seating.parameters, viewer: viewer.id },
  )
  return rows.map((row) => ({
    ...row,
    sharedPupils: count(row.sharedPupils),
    unanswered: count(row.unanswered),
  }))
}

export interface PupilListRow {
  id: string
  name: string
  writingHand: WritingHand | null
  advice: number
  unanswered: number
  changedAt: Date | null
}

/** Pupils of one class the viewer teaches now whose family shares something. Another class does not exist for them. */
export const listPupils = async (
  viewer: Viewer,
  classId: string,
  slice: PageSlice,
): Promise<PageOf<PupilListRow>> => {
  const scope = childScope(viewer, 'teacher', 'c.id')
  const own =
    isId(classId) &&
    (await selectOne(`SELECT k.id FROM school_classes k WHERE k.id = :classId AND ${taughtByViewer}`, {
      classId,
      viewer: viewer.id,
      scopeNow: now(),
    }))
  if (!own) throw notFound()
  const seating = shares('share_school_seating', 'c.id')
  const live = `FROM school_advice a ${newestAnswer(ofPresentTeachers)}
    WHERE a.childId = c.id AND a.endedAt IS NULL AND ${seating.sql}`
  const page = await selectPage<
    Omit<PupilListRow, 'advice' | 'unanswered'> & { advice: string; unanswered: string }
  >(
    {
      select: `c.id, ${calledName('c')} AS name, c.writingHand, (SELECT COUNT(*) ${live}) AS advice,
        (SELECT COUNT(*) ${live} AND r.id IS NULL) AS unanswered, (SELECT MAX(a.publishedAt) ${live}) AS changedAt`,
      from: `FROM children c WHERE c.schoolClassId = :classId AND ${scope.sql}`,
      orderBy: 'COALESCE(c.preferredName, c.givenName), c.familyName, c.id',
      parameters: { ...scope.parameters, ...seating.parameters, classId },
    },
    slice,
  )
  return {
    total: page.total,
    rows: page.rows.map((row) => ({ ...row, advice: count(row.advice), unanswered: count(row.unanswered) })),
  }
}

export interface PupilRecord {
  id: string
  name: string
  className: string
  writingHand: WritingHand | null
  /** Decides which caution is printed; not shown. */
  scriptDirection: ScriptDirection
}

export const findPupil = async (access: ChildAccess): Promise<PupilRecord> => {
  const scope = within(access, 'c.id')
  const row = await selectOne<PupilRecord>(
    `SELECT c.id, ${calledName('c')} AS name, k.name AS className, c.writingHand, c.scriptDirection
     FROM children c JOIN school_classes k ON k.id = c.schoolClassId WHERE ${scope.sql}`,
    scope.parameters,
  )
  if (!row) throw notFound()
  return row
}

/** Advice in force, while the family shares seating and classroom advice; otherwise none. */
export const listPupilAdvice = (access: ChildAccess): Promise<AdviceRow[]> => {
  const scope = within(access, 'a.childId')
  const seating = shares('share_school_seating', 'a.childId')
  return selectRows<AdviceRow>(
    `SELECT ${adviceColumns} FROM school_advice a ${newestAnswer(ofPresentTeachers)}
     WHERE a.endedAt IS NULL AND ${seating.sql} AND ${scope.sql} ORDER BY a.publishedAt, a.itemId, a.id`,
    { ...scope.parameters, ...seating.parameters },
  )
}

/** What the child said they want, while the family shares goals; otherwise nothing. */
export const listPupilGoals = async (access: ChildAccess): Promise<string[]> => {
  const scope = within(access, 'g.childId')
  const goals = shares('share_school_goals', 'g.childId')
  const rows = await selectRows<{ details: string }>(
    `SELECT g.details FROM goals g WHERE g.endedOn IS NULL AND ${goals.sql} AND ${scope.sql}
     ORDER BY g.setOn, g.createdAt, g.id`,
    { ...scope.parameters, ...goals.parameters },
  )
  return rows.map((row) => fromJson<GoalDetails>(row.details).childVoice)
}

/** The item a teacher answers to, whether still in force or not; 404 unless advice is shared now. */
export const findPupilAdvice = async (
  access: ChildAccess,
  id: string,
  tx: Tx,
): Promise<{ id: string; endedAt: Date | null }> => {
  if (!isId(id)) throw notFound()
  const scope = within(access, 'a.childId')
  const seating = shares('share_school_seating', 'a.childId')
  const row = await selectOne<{ id: string; endedAt: Date | null }>(
    `SELECT a.id, a.endedAt FROM school_advice a WHERE a.id = :id AND ${seating.sql} AND ${scope.sql} FOR UPDATE`,
    { id, ...scope.parameters, ...seating.parameters },
    tx,
  )
  if (!row) throw notFound()
  return row
}
