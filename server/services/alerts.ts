import { randomUUID } from 'node:crypto'
import { IsNull } from 'typeorm'
import type { Attention } from '../../shared/attention.ts'
import type { AlertAction, AlertRaised } from '../../shared/alerts.ts'
import { addWorkingDays, type Day } from '../../shared/days.ts'
import { redFlagRows, type RedFlagUrgency } from '../../shared/redFlagRows.ts'
import type { ReferralFlag } from '../../shared/referralFlags.ts'
import { alertTask } from '../../shared/tasks.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Alert } from '../entities/Alert.ts'
import { Task } from '../entities/Task.ts'
import { conflict } from '../errors.ts'
import { findForChild } from '../queries/scope.ts'
import { selectOne } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { addToAlert, askToLook, insertAlert } from './redFlags.ts'
import { addTask } from './tasks.ts'
import { transact } from './transact.ts'
import { updateIfCurrent } from './versions.ts'

/** Working days in which a sign that is due, but not overdue from the start, is looked at (clinic rule). */
const daysToLook = 5

export interface NewAlert {
  childId: string
  /** Who holds the child; null gives the task to the lead. */
  therapistId: string | null
  today: Day
  /** Stable word for programs. */
  flag: string
  /** What was noticed and what is usually done. */
  text: string
  level: Attention
  /** What it calls for; left out, a pressing sign asks for a medical review and any other for a look. */
  urgency?: RedFlagUrgency
  /** What somebody must do about it. */
  task: string
}

/**
 * Puts a warning sign on the record, with a task unless it only asks to be kept in mind; one that stands is added to. A
 * sign is a reason to look; what it means is for the therapist to decide.
 */
export const raiseAlert = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  { childId, therapistId, today, flag, text, level, urgency, task }: NewAlert,
): Promise<void> => {
  const calledFor = urgency ?? (level === 'overdue' ? 'medical_review' : 'ask')
  // As in `raiseFlags`: a sign stands once while nobody has acted on it.
  await selectOne('SELECT id FROM children WHERE id = :childId FOR UPDATE', { childId }, tx)
  const open = await selectOne<{ id: string; text: string; version: number }>(
    `SELECT a.id, a.text, a.version FROM alerts a
     WHERE a.childId = :childId AND a.flag = :flag AND a.actedAt IS NULL ORDER BY a.raisedAt, a.id LIMIT 1 FOR UPDATE`,
    { childId, flag },
    tx,
  )
  if (open?.text.includes(text)) return
  if (open && (await addToAlert(tx, record, open, { words: text, childId, relation: null }))) {
    await askToLook(tx, childId, [{ urgency: calledFor }])
    return
  }
  const id = randomUUID()
  await tx.insert(Alert, {
    id,
    childId,
    flag,
    text,
    level,
    urgency: calledFor,
    advice: null,
    origin: 'referral',
    originId: null,
    holdsBooking: level === 'overdue',
    raisedAt: now(),
    raisedById: null,
    actedAt: null,
    actedById: null,
    action: null,
  })
  record({ action: 'alert.raised', objectType: 'alert', objectId: id, childId, detail: { flag } })
  if (level === 'soon') return
  await addTask(tx, {
    childId,
    kind: alertTask,
    text: task,
    dueOn: level === 'overdue' ? today : addWorkingDays(today, daysToLook),
    assigneeId: therapistId,
    otherwise: 'clinicLead',
  })
}

const wordsOf = ({ text, words }: ReferralFlag) =>
  words === null ? text : `${text} Words of the referral: “${words.slice(0, 120)}”.`

/** The warning signs of a referral, on the record of the child it became. */
export const raiseReferralFlags = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  child: Pick<NewAlert, 'childId' | 'therapistId' | 'today'>,
  flags: readonly ReferralFlag[],
): Promise<void> => {
  for (const flag of flags)
    await raiseAlert(tx, record, {
      ...child,
      flag: flag.id,
      text: wordsOf(flag),
      level: flag.level,
      urgency: flag.urgency,
      task: 'A warning sign stands on the referral: look at it and write down what was done',
    })
}

/** The tasks that warning signs gave are done once every sign on the record has its answer. */
const closeTasks = async (tx: Tx, { childId, viewer }: ChildAccess) => {
  if (await tx.existsBy(Alert, { childId, actedAt: IsNull() })) return
  await tx.update(
    Task,
    { childId, kind: alertTask, doneAt: IsNull() },
    { doneAt: now(), doneById: viewer.id },
  )
}

/** Writes down what was done about a warning sign. It then leaves the head of the record and stays in the history. */
export const actOnAlert = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  { action }: AlertAction,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const alert = await findForChild(access, Alert, id, tx, { lock: true })
    if (alert.actedAt) throw conflict('closed', 'Somebody has written down already what was done about this.')
    await updateIfCurrent(tx, Alert, id, alert.version, {
      actedAt: now(),
      actedById: access.viewer.id,
      action,
    })
    await closeTasks(tx, access)
    record({
      action: 'alert.acted_on',
      objectType: 'alert',
      objectId: id,
      childId: access.childId,
      relation: access.relation,
    })
  })

/** Puts a sign on the record that a therapist or the lead saw or was told, with its row of the clinic's table. */
export const raiseByHand = (
  actor: Actor,
  { childId, relation, viewer }: ChildAccess,
  { flag, words }: AlertRaised,
  key: string | null,
): Promise<string> =>
  transact(actor, (tx, record) => {
    const factOf = (id: string): AuditFact => ({
      action: 'alert.raised_by_hand',
      objectType: 'alert',
      objectId: id,
      childId,
      relation,
      detail: { flag },
    })
    const request = ['alert', childId, { flag, words }]
    return createOnce(tx, actor, record, { key, request }, factOf, async (id) => {
      const row = redFlagRows[flag]
      const from = { id, childId, origin: 'therapist', originId: null, raisedById: viewer.id } as const
      await insertAlert(tx, from, { ...row, words })
      await askToLook(tx, childId, [row])
    })
  })
