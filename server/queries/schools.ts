import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { runsAt } from './inForce.ts'
import { selectPage, type PageOf, type PageSlice } from './pages.ts'
import { likePattern, selectOne, selectRows } from './sql.ts'

export interface SchoolRow {
  id: string
  name: string
  town: string | null
}

export interface ClassRow {
  id: string
  schoolId: string
  schoolName: string
  name: string
  schoolYear: number
  ages: string | null
  version: number
  teacherId: string | null
  teacherName: string | null
}

export const listSchools = (search: string | null, slice: PageSlice): Promise<PageOf<SchoolRow>> =>
  selectPage<SchoolRow>(
    {
      select: 's.id, s.name, s.town',
      from: `FROM schools s ${search === null ? '' : 'WHERE s.name LIKE :word OR s.town LIKE :word'}`,
      orderBy: 's.name, s.id',
      parameters: search === null ? {} : { word: likePattern(search) },
    },
    slice,
  )

// A class has one teacher at a time; should two links ever overlap, the newest counts.
const classColumns = `SELECT k.id, k.schoolId, s.name AS schoolName, k.name, k.schoolYear, k.ages, k.version,
    t.id AS teacherId, t.displayName AS teacherName
  FROM school_classes k JOIN schools s ON s.id = k.schoolId
    LEFT JOIN users t ON t.id = (SELECT ct.teacherId FROM class_teachers ct WHERE ct.schoolClassId = k.id
      AND ${runsAt('ct')}
      ORDER BY ct.startedAt DESC, ct.id LIMIT 1)`

export const findSchool = (id: string): Promise<SchoolRow | null> =>
  selectOne<SchoolRow>('SELECT id, name, town FROM schools WHERE id = :id', { id })

export const listClassesOf = async (schoolIds: readonly string[]): Promise<ClassRow[]> =>
  schoolIds.length === 0
    ? []
    : selectRows<ClassRow>(
        `${classColumns} WHERE k.schoolId IN (:schoolIds) ORDER BY k.schoolYear DESC, k.name, k.id`,
        { schoolIds, now: now() },
      )

export const findClass = (id: string, tx?: Tx): Promise<ClassRow | null> =>
  selectOne<ClassRow>(`${classColumns} WHERE k.id = :id`, { id, now: now() }, tx)

/** Enough for the schools of one clinic's town; newest school years first, so that old ones fall off the end. */
const mostChoices = 500

export const listClassChoices = (): Promise<ClassRow[]> =>
  selectRows<ClassRow>(`${classColumns} ORDER BY k.schoolYear DESC, s.name, k.name, k.id LIMIT :most`, {
    now: now(),
    most: mostChoices,
  })
