import type { Day } from '../../../shared/days.ts'
import type { Viewer } from '../../access/actor.ts'
import { therapistName } from '../currentTherapist.ts'
import { selectPage, type PageOf, type PageSlice } from '../pages.ts'
import { count, likePattern, selectRows, type Fragment } from '../sql.ts'
import { staffScope } from '../staffScope.ts'

/** Every word must be in a name or the record number, in any order. */
export const matchesWords = (search: string): Fragment => {
  const words = search.split(/\s+/u).slice(0, 6)
  return {
    sql: words
      .map(
        (_word, index) =>
          `CONCAT_WS(' ', c.givenName, c.preferredName, c.familyName, c.recordNumber) LIKE :word${index}`,
      )
      .join(' AND '),
    parameters: Object.fromEntries(words.map((word, index) => [`word${index}`, likePattern(word)])),
  }
}

export interface FoundChildRow {
  id: string
  recordNumber: string
  givenName: string
  familyName: string
  preferredName: string | null
  birthDate: Day
  schoolName: string | null
}

const foundColumns =
  'c.id, c.recordNumber, c.givenName, c.familyName, c.preferredName, c.birthDate, s.name AS schoolName'
const withSchool =
  'FROM children c LEFT JOIN school_classes k ON k.id = c.schoolClassId LEFT JOIN schools s ON s.id = k.schoolId'

/** At most ten children whom the viewer may see, by name or record number. */
export const findChildren = (viewer: Viewer, search: string): Promise<FoundChildRow[]> => {
  const scope = staffScope(viewer, 'c.id', ['assignedTherapist', 'clinicLead', 'administrator'])
  const words = matchesWords(search)
  return selectRows<FoundChildRow>(
    `SELECT ${foundColumns} ${withSchool} WHERE ${words.sql} AND ${scope.sql}
     ORDER BY c.familyName, c.givenName, c.birthDate, c.id LIMIT 10`,
    { ...words.parameters, ...scope.parameters },
  )
}

export interface RegisterListRow extends FoundChildRow {
  className: string | null
  therapist: string | null
  carers: number
}

/** The administrator's register: identity and contact of every child, no clinical field. */
export const listRegister = async (
  viewer: Viewer,
  search: string | null,
  slice: PageSlice,
): Promise<PageOf<RegisterListRow>> => {
  const scope = staffScope(viewer, 'c.id', ['administrator'])
  const therapist = therapistName('c.id')
  const words = search === null ? null : matchesWords(search)
  const found = await selectPage<Omit<RegisterListRow, 'carers'> & { carers: string }>(
    {
      select: `${foundColumns}, k.name AS className, ${therapist.sql} AS therapist,
        (SELECT COUNT(*) FROM guardians g WHERE g.childId = c.id AND g.endedAt IS NULL) AS carers`,
      from: `${withSchool} WHERE ${scope.sql} ${words ? `AND ${words.sql}` : ''}`,
      orderBy: 'c.familyName, c.givenName, c.birthDate, c.id',
      parameters: { ...scope.parameters, ...therapist.parameters, ...words?.parameters },
    },
    slice,
  )
  return { total: found.total, rows: found.rows.map((row) => ({ ...row, carers: count(row.carers) })) }
}
