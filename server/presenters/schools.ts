import type { ClassChoice, SchoolView } from '../../shared/schools.ts'
import type { Viewer } from '../access/actor.ts'
import { canChangeSchools } from '../policies/schools.ts'
import type { ClassRow, SchoolRow } from '../queries/schools.ts'

const presentClass = (row: ClassRow): SchoolView['classes'][number] => ({
  id: row.id,
  name: row.name,
  schoolYear: row.schoolYear,
  ages: row.ages,
  teacher:
    row.teacherId === null || row.teacherName === null ? null : { id: row.teacherId, name: row.teacherName },
  version: row.version,
})

export const presentSchool = (
  school: SchoolRow,
  classes: readonly ClassRow[],
  viewer: Viewer,
): SchoolView => ({
  id: school.id,
  name: school.name,
  town: school.town,
  classes: classes.filter((row) => row.schoolId === school.id).map(presentClass),
  can: { change: canChangeSchools(viewer) },
})

/** 2026 → '2026/27'. */
export const schoolYearWords = (firstYear: number): string =>
  `${firstYear}/${String((firstYear + 1) % 100).padStart(2, '0')}`

export const presentClassChoice = (row: ClassRow): ClassChoice => ({
  id: row.id,
  label: `${row.schoolName}, ${row.name} (${schoolYearWords(row.schoolYear)})`,
})

/** What a stale save of a class is answered with. */
export const presentCurrentClass = (row: ClassRow) => ({ ...presentClass(row), schoolId: row.schoolId })
