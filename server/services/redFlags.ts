import { randomUUID } from 'node:crypto'
import type { AlertOrigin } from '../../shared/alerts.ts'
import { addWorkingDays, compareDays, type Day } from '../../shared/days.ts'
import { attentionOf, type RedFlagRow } from '../../shared/redFlagRows.ts'
import type { RedFlag } from '../../shared/redFlags.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import { alertTask } from '../../shared/tasks.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Alert } from '../entities/Alert.ts'
import { selectOne, selectRows } from '../queries/sql.ts'
import { currentTherapist } from './assignments.ts'
import type { AuditFact } from './audit.ts'
import { clinicToday, readSettings } from './settings.ts'
import { addTask } from './tasks.ts'
import { updateIfCurrent } from './versions.ts'

/** Working days in which a sign that is not pressing from the start is looked at (clinic rule). */
const daysToLook = 5
const longestText = 500

export interface RaisedFlags {
  childId: string
  origin: AlertOrigin
  /** The answer, measure or observation that shows them; null when a person raised them by hand. */
  originId: string | null
  flags: readonly RedFlag[]
  /** Ids of flags under which a sign is new since the origin was last saved: raised even if once acted on. */
  fresh?: readonly string[]
  /** Null when nobody signed in gave the answer. */
  raisedById: string | null
  /** How the person who gave the answer stands to the child, for the trail. */
  relation?: ChildRelation | null
}

interface Standing {
  id: string
  flag: string
  text: string
  originId: string | null
  actedAt: Date | null
  version: number
}

/** Adds words to a sign that stands; false, with nothing done, where its text would grow too long. */
export const addToAlert = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  { id, text, version }: Pick<Standing, 'id' | 'text' | 'version'>,
  { words, childId, relation }: { words: string; childId: string; relation: ChildRelation | null },
): Promise<boolean> => {
  const added = `${text} Reported since: ${words}`
  if ([...added].length > longestText) return false
  await updateIfCurrent(tx, Alert, id, version, { text: added })
  record({ action: 'alert.added_to', objectType: 'alert', objectId: id, childId, relation })
  return true
}

/**
 * Puts red flags on the record in the transaction that stores the answer. A flag stands once while nobody has acted on
 * it; a further sign is added to its text. It is never taken back when an answer changes, and what was acted on comes
 * back only with something new. Answers the ids of the alerts made or added to.
 */
export const raiseFlags = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  { childId, origin, originId, flags, fresh = [], raisedById, relation = null }: RaisedFlags,
): Promise<string[]> => {
  if (flags.length === 0) return []
  // Two answers of one child come one after the other, so that neither raises what the other just did.
  await selectOne('SELECT id FROM children WHERE id = :childId FOR UPDATE', { childId }, tx)
  // A locking read: it sees what the other one committed.
  const standing = await selectRows<Standing>(
    `SELECT a.id, a.flag, a.text, a.originId, a.actedAt, a.version FROM alerts a
     WHERE a.childId = :childId AND a.flag IN (:flags) FOR UPDATE`,
    { childId, flags: flags.map(({ id }) => id) },
    tx,
  )
  const touched: string[] = []
  // What was added to counts too: it may stand from a referral, with a task that is not for today.
  const told: RedFlag[] = []
  for (const flag of flags) {
    const same = standing.filter((alert) => alert.flag === flag.id)
    const open = same.find(({ actedAt }) => actedAt === null)
    const isNew = fresh.includes(flag.id)
    if (open && (open.text.includes(flag.words) || !isNew)) continue
    if (!open && !isNew && same.some((alert) => originId !== null && alert.originId === originId)) continue
    told.push(flag)
    if (open && (await addToAlert(tx, record, open, { words: flag.words, childId, relation }))) {
      touched.push(open.id)
      continue
    }
    const id = randomUUID()
    await insertAlert(tx, { id, childId, origin, originId, raisedById }, flag)
    const detail = { flag: flag.id, origin }
    record({ action: 'alert.raised', objectType: 'alert', objectId: id, childId, relation, detail })
    touched.push(id)
  }
  if (told.length > 0) await askToLook(tx, childId, told)
  return touched
}

/** One alert with the urgency, the advice and the hold of its row; the caller records it. */
export const insertAlert = async (
  tx: Tx,
  from: Pick<RaisedFlags, 'childId' | 'origin' | 'originId' | 'raisedById'> & { id: string },
  flag: RedFlagRow & { words: string },
): Promise<void> => {
  await tx.insert(Alert, {
    ...from,
    flag: flag.id,
    text: flag.words,
    level: attentionOf[flag.urgency],
    urgency: flag.urgency,
    advice: flag.action,
    holdsBooking: flag.holdsBooking,
    raisedAt: now(),
    actedAt: null,
    actedById: null,
    action: null,
  })
}

const sameDayTask =
  'Today: a sign that needs medical help the same day was reported. Reach the family and write down what was done'

/**
 * One open task is enough for all signs of a child, as long as it is due early enough for the newest. A sign for the same
 * day has a task that says so, whatever else is open.
 */
export const askToLook = async (
  tx: Tx,
  childId: string,
  flags: readonly Pick<RedFlagRow, 'urgency'>[],
): Promise<void> => {
  const today = clinicToday(await readSettings(tx))
  const pressing = flags.some(({ urgency }) => attentionOf[urgency] === 'overdue')
  const dueOn: Day = pressing ? today : addWorkingDays(today, daysToLook)
  const sameDay = flags.some(({ urgency }) => urgency === 'same_day')
  const open = await selectRows<{ dueOn: Day | null; text: string }>(
    `SELECT t.dueOn, t.text FROM tasks t WHERE t.childId = :childId AND t.kind = :alertTask AND t.doneAt IS NULL`,
    { childId, alertTask },
    tx,
  )
  const enough = sameDay ? open.filter(({ text }) => text === sameDayTask) : open
  if (enough.some((task) => task.dueOn !== null && compareDays(task.dueOn, dueOn) <= 0)) return
  await addTask(tx, {
    childId,
    kind: alertTask,
    text: sameDay
      ? sameDayTask
      : 'A warning sign was reported: look at the record and write down what was done',
    dueOn,
    assigneeId: await currentTherapist(tx, childId),
    otherwise: 'clinicLead',
  })
}
