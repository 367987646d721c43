import { birthDateProblem } from '../../shared/birthDates.ts'
import {
  writingHandLabels,
  type Allocation,
  type CareDetails,
  type ChildIdentity,
  type WritingHand,
} from '../../shared/children.ts'
import { addWorkingDays, compareDays, type Day } from '../../shared/days.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { Child } from '../entities/Child.ts'
import { SchoolClass } from '../entities/SchoolClass.ts'
import { conflict, invalid } from '../errors.ts'
import { canJudgeCompetence } from '../policies/children.ts'
import { findIdentity } from '../queries/children/identity.ts'
import { lockChild } from '../queries/lockChild.ts'
import { selectOne } from '../queries/sql.ts'
import { raiseAlert } from './alerts.ts'
import { assign, currentTherapist } from './assignments.ts'
import type { AuditFact } from './audit.ts'
import { lockOpenEpisode } from './episodes.ts'
import { clinicToday, readSettings } from './settings.ts'
import { addTask } from './tasks.ts'
import { transact } from './transact.ts'
import { updateIfCurrent } from './versions.ts'

const fact = (access: ChildAccess, action: string): AuditFact => ({
  action,
  objectType: 'child',
  objectId: access.childId,
  childId: access.childId,
  relation: access.relation,
})

/** Changes identity and contact facts. A change of class makes the therapist look at what the school was told. Throws StaleWrite. */
export const changeIdentity = async (
  actor: Actor,
  access: ChildAccess,
  version: number,
  { classId, ...identity }: ChildIdentity,
): Promise<void> => {
  const today = clinicToday(await readSettings())
  const problem = birthDateProblem(identity.birthDate, today)
  if (problem !== null) throw invalid({ birthDate: problem })
  await transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    const before = await findIdentity(access, tx)
    if (identity.consentsForSelf !== before.consentsForSelf && !canJudgeCompetence(access))
      throw invalid({ consentsForSelf: 'Whether a young person decides alone is for the therapist to say' })
    if (classId !== null && !(await tx.existsBy(SchoolClass, { id: classId })))
      throw invalid({ classId: 'This class is not on the list' })
    await updateIfCurrent(tx, Child, access.childId, version, {
      ...identity,
      schoolClassId: classId,
    })
    if (classId !== before.classId) await askAboutSchool(tx, access, today)
    record(fact(access, 'child.identity_changed'))
  })
}

const askAboutSchool = async (tx: Tx, { childId }: ChildAccess, today: Day) => {
  const advice = await selectOne(
    'SELECT a.id FROM school_advice a WHERE a.childId = :childId AND a.endedAt IS NULL LIMIT 1',
    { childId },
    tx,
  )
  if (!advice) return
  await addTask(tx, {
    childId,
    kind: 'class_changed',
    text: 'The class changed: see whether the advice to school still fits, and who reads it now',
    dueOn: addWorkingDays(today, 5),
    assigneeId: await currentTherapist(tx, childId),
    otherwise: 'clinicLead',
  })
}

/** Keeps strengths, writing hand and next review. A hand that changed is looked at by a person. Throws StaleWrite. */
export const changeCare = async (
  actor: Actor,
  access: ChildAccess,
  version: number,
  care: CareDetails,
): Promise<void> => {
  const today = clinicToday(await readSettings())
  await transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    const before = await tx.findOneByOrFail(Child, { id: access.childId })
    const { nextReviewOn } = care
    if (nextReviewOn !== null && nextReviewOn !== before.nextReviewOn && compareDays(nextReviewOn, today) < 0)
      throw invalid({ nextReviewOn: 'The next review cannot be in the past' })
    await updateIfCurrent(tx, Child, access.childId, version, care)
    record(fact(access, 'child.care_changed'))
    if (before.writingHand !== null && care.writingHand !== null && before.writingHand !== care.writingHand)
      await noteChangeOfHand(tx, record, access, before.writingHand, care.writingHand, today)
  })
}

const noteChangeOfHand = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  { childId }: ChildAccess,
  from: WritingHand,
  to: WritingHand,
  today: Day,
) =>
  raiseAlert(tx, record, {
    childId,
    therapistId: await currentTherapist(tx, childId),
    today,
    flag: 'change-of-hand',
    level: 'due',
    text:
      `Writing hand recorded as ${writingHandLabels[to].toLowerCase()}, before as ` +
      `${writingHandLabels[from].toLowerCase()}. Usual step: write down date and cause and ask for a medical review. ` +
      'New weakness, numbness, a drooping face, headache or a seizure: same-day medical advice.',
    task: 'The writing hand changed: write down date and cause, and ask for a medical review',
  })

/** Gives the child to a therapist, or to nobody for now. The one before loses the record with the next request. */
export const allocate = (
  actor: Actor,
  access: ChildAccess,
  { therapistId, reason }: Allocation,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    if (!(await lockOpenEpisode(tx, access.childId)))
      throw conflict('closed', 'This episode is closed. A new referral opens a new one.')
    if ((await currentTherapist(tx, access.childId)) === therapistId)
      throw invalid({
        therapistId:
          therapistId === null
            ? 'Nobody holds this child now: choose a therapist'
            : 'This therapist holds the child already',
      })
    await assign(tx, record, { childId: access.childId, therapistId, reason, relation: access.relation })
  })
