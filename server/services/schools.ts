import { randomUUID } from 'node:crypto'
import type { SchoolClassDetails, SchoolDetails } from '../../shared/schools.ts'
import { isId } from '../../shared/fields.ts'
import type { Actor } from '../access/actor.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { ClassTeacher } from '../entities/ClassTeacher.ts'
import { School } from '../entities/School.ts'
import { SchoolClass } from '../entities/SchoolClass.ts'
import { User } from '../entities/User.ts'
import { invalid, notFound } from '../errors.ts'
import { findClass } from '../queries/schools.ts'
import { execute } from '../queries/sql.ts'
import { createOnce } from './once.ts'
import { transact } from './transact.ts'
import { unlessTaken } from './uniqueness.ts'
import { updateIfCurrent } from './versions.ts'

/** Answers the new school's id. A name that is taken is a 422. */
export const createSchool = (actor: Actor, details: SchoolDetails, key: string | null): Promise<string> =>
  transact(actor, (tx, record) =>
    createOnce(
      tx,
      actor,
      record,
      { key, request: ['school', details] },
      (id) => ({ action: 'school.created', objectType: 'school', objectId: id }),
      async (id) => {
        await unlessTaken(tx.insert(School, { id, ...details, createdAt: now() }), {
          name: 'A school of this name is on the list already',
        })
      },
    ),
  )

const assertTeacher = async (tx: Tx, teacherId: string | null) => {
  if (teacherId === null) return
  const teacher = await tx.findOneBy(User, { id: teacherId })
  if (!teacher || teacher.disabledAt || !teacher.roles.includes('teacher'))
    throw invalid({ teacherId: 'Choose a teacher who has an account here' })
}

const assertSchool = async (tx: Tx, schoolId: string) => {
  if (!(await tx.existsBy(School, { id: schoolId })))
    throw invalid({ schoolId: 'This school is not on the list' })
}

const classTaken = { name: 'This school has a class of this name in that school year already' }

/** Answers the new class's id. */
export const createClass = (actor: Actor, details: SchoolClassDetails, key: string | null): Promise<string> =>
  transact(actor, (tx, record) =>
    createOnce(
      tx,
      actor,
      record,
      { key, request: ['class', details] },
      (id) => ({ action: 'schoolClass.created', objectType: 'schoolClass', objectId: id }),
      async (id) => {
        const { teacherId, ...columns } = details
        await assertSchool(tx, details.schoolId)
        await assertTeacher(tx, teacherId)
        await unlessTaken(tx.insert(SchoolClass, { id, ...columns, createdAt: now() }), classTaken)
        if (teacherId !== null) await linkTeacher(tx, id, teacherId)
      },
    ),
  )

const linkTeacher = (tx: Tx, schoolClassId: string, teacherId: string) =>
  tx.insert(ClassTeacher, { id: randomUUID(), schoolClassId, teacherId, startedAt: now(), endedAt: null })

/** Changes a class and who teaches it; throws StaleWrite when somebody saved in between. The earlier teacher's link ends at once, and with it what they saw. */
export const changeClass = (
  actor: Actor,
  id: string,
  version: number,
  details: SchoolClassDetails,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const before = isId(id) ? await findClass(id, tx) : null
    if (!before) throw notFound()
    const { teacherId, ...columns } = details
    await assertSchool(tx, details.schoolId)
    if (teacherId !== before.teacherId) await assertTeacher(tx, teacherId)
    await unlessTaken(updateIfCurrent(tx, SchoolClass, id, version, columns), classTaken)
    record({ action: 'schoolClass.changed', objectType: 'schoolClass', objectId: id })
    if (teacherId === before.teacherId) return
    await execute(
      tx,
      'UPDATE class_teachers SET endedAt = :now WHERE schoolClassId = :id AND (endedAt IS NULL OR endedAt > :now)',
      { id, now: now() },
    )
    if (teacherId !== null) await linkTeacher(tx, id, teacherId)
    record({
      action: 'schoolClass.teacher_changed',
      objectType: 'schoolClass',
      objectId: id,
      detail: { from: before.teacherId, to: teacherId },
    })
  })
