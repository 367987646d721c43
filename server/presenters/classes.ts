import { dayOf } from '../../shared/days.ts'
import type { PupilRow, PupilView, TeacherClassRow } from '../../shared/schoolAdvice.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { OwnClassRow, PupilListRow, PupilRecord } from '../queries/classes.ts'
import type { AdviceRow } from '../queries/schoolAdvice.ts'
import { presentAdvice } from './schoolAdvice.ts'

export const presentOwnClass = (row: OwnClassRow): TeacherClassRow => ({
  id: row.id,
  name: row.name,
  school: row.school,
  schoolYear: row.schoolYear,
  sharedPupils: row.sharedPupils,
  unanswered: row.unanswered,
})

export const presentPupilRow = (row: PupilListRow, timeZone: string): PupilRow => ({
  id: row.id,
  name: row.name,
  writingHand: row.writingHand,
  advice: row.advice,
  unanswered: row.unanswered,
  changedOn: row.changedAt && dayOf(row.changedAt, timeZone),
})

export const presentPupil = (
  pupil: PupilRecord,
  related: { advice: AdviceRow[]; goals: string[] },
  access: ChildAccess,
  timeZone: string,
): PupilView => ({
  id: pupil.id,
  name: pupil.name,
  className: pupil.className,
  writingHand: pupil.writingHand,
  advice: presentAdvice(related.advice, access, pupil.scriptDirection, timeZone),
  goals: related.goals,
})
