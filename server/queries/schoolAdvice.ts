import type { Day } from '../../shared/days.ts'
import type { AdviceReply } from '../../shared/schoolAdvice.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { notFound } from '../errors.ts'
import { runsAt } from './inForce.ts'
import { within } from './scope.ts'
import { selectOne, selectRows } from './sql.ts'

export interface ChildSchoolRow {
  school: string | null
  className: string | null
  teacher: string | null
}

/** School, class and present teachers of the child. */
export const findChildSchool = async (access: ChildAccess): Promise<ChildSchoolRow> => {
  const scope = within(access, 'c.id')
  const row = await selectOne<ChildSchoolRow>(
    `SELECT s.name AS school, k.name AS className,
       (SELECT GROUP_CONCAT(u.displayName ORDER BY ct.startedAt, u.id SEPARATOR ', ') FROM class_teachers ct
         JOIN users u ON u.id = ct.teacherId WHERE ct.schoolClassId = k.id AND ${runsAt('ct')}) AS teacher
     FROM children c LEFT JOIN school_classes k ON k.id = c.schoolClassId LEFT JOIN schools s ON s.id = k.schoolId
     WHERE ${scope.sql}`,
    { ...scope.parameters, now: now() },
  )
  if (!row) throw notFound()
  return row
}

export interface AdviceRow {
  id: string
  itemId: string
  because: string
  checkBy: Day
  publishedAt: Date
  endedAt: Date | null
  reply: AdviceReply | null
  replyReason: string | null
  repliedBy: string | null
  repliedAt: Date | null
}

/** Columns of an item given to a school, with the newest answer that `answers` (a condition on r) lets through. */
export const adviceColumns =
  'a.id, a.itemId, a.because, a.checkBy, a.publishedAt, a.endedAt, r.reply, ' +
  'r.reason AS replyReason, ru.displayName AS repliedBy, r.at AS repliedAt'

export const newestAnswer = (condition: string) => `LEFT JOIN advice_answers r ON r.id = (SELECT n.id
    FROM advice_answers n WHERE n.adviceId = a.id AND ${condition} ORDER BY n.at DESC, n.id LIMIT 1)
  LEFT JOIN users ru ON ru.id = r.byId`

/** A record keeps what was given before; the page shows this many of the ended ones at most. */
const mostRows = 60

/** All items given to the school, those in force first, with the newest answer of any teacher. */
export const listAdvice = (access: ChildAccess): Promise<AdviceRow[]> => {
  const scope = within(access, 'a.childId')
  return selectRows<AdviceRow>(
    `SELECT ${adviceColumns} FROM school_advice a ${newestAnswer('1 = 1')}
     WHERE ${scope.sql} ORDER BY a.endedAt IS NOT NULL, a.publishedAt DESC, a.itemId, a.id LIMIT :most`,
    { ...scope.parameters, most: mostRows },
  )
}

/** Library ids of the items in force, read under lock inside the transaction that may add to them. */
export const listLiveItemIds = async (access: ChildAccess, tx: Tx): Promise<string[]> => {
  const scope = within(access, 'a.childId')
  const rows = await selectRows<{ itemId: string }>(
    `SELECT a.itemId FROM school_advice a WHERE a.endedAt IS NULL AND ${scope.sql} FOR UPDATE`,
    scope.parameters,
    tx,
  )
  return rows.map((row) => row.itemId)
}
