import { randomUUID } from 'node:crypto'
import { ageInMonths, type Day } from '../../shared/days.ts'
import type { WritingHand } from '../../shared/children.ts'
import {
  emptyHistory,
  historyDayProblems,
  type HistoryDetails,
  type HistoryInformant,
} from '../../shared/histories.ts'
import { newlyRaised } from '../../shared/redFlags.ts'
import { redFlagsOfHistory } from '../../shared/redFlagSources.ts'
import { flagsInHistoryWords, type QuotedFlag } from '../../shared/redFlagWords.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { History } from '../entities/History.ts'
import { conflict, invalid, notFound } from '../errors.ts'
import { selectOne } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { raiseFlags } from './redFlags.ts'
import { raiseWrittenFlags } from './redFlagWords.ts'
import { clinicToday, readSettings } from './settings.ts'
import { updateIfCurrent } from './versions.ts'

/* What is stored of a history and what follows from it, whoever answers: in the transaction of the caller. */

type Record = (fact: AuditFact) => void

export interface NewHistory {
  childId: string
  informant: HistoryInformant
  respondentName: string | null
  answeredOn: Day
  /** Set when a carer answers what the clinic asked for. */
  requestId: string | null
  guardianId: string | null
  /** Null when a carer without an account answers. */
  startedById: string | null
  replacesId: string | null
}

/** Families answer their own histories and therapists write down theirs; nobody else changes either. */
const relationTo = ({ informant }: { informant: HistoryInformant }): ChildRelation =>
  informant === 'guardian' ? 'guardian' : 'assignedTherapist'

export const historyFact = (
  history: { id: string; childId: string; informant: HistoryInformant },
  action: string,
): AuditFact => ({
  action: `history.${action}`,
  objectType: 'history',
  objectId: history.id,
  childId: history.childId,
  relation: relationTo(history),
})

export const insertHistory = async (tx: Tx, id: string, details: HistoryDetails, begun: NewHistory) => {
  await tx.insert(History, { ...begun, id, details, lockedAt: null, lockedById: null, createdAt: now() })
}

/**
 * Begins a history in which nothing is answered. Answers its id; its version is 1. The caller checks consent and, of one
 * that the clinic asked for, records who answered.
 */
export const beginHistory = async (tx: Tx, record: Record, begun: NewHistory): Promise<string> => {
  const id = randomUUID()
  await insertHistory(tx, id, emptyHistory, begun)
  if (begun.requestId === null) record(historyFact({ ...begun, id }, 'started'))
  return id
}

export interface HistorySave {
  /** Locked by the caller (FOR UPDATE). */
  history: History
  /** The version the page was made from. */
  version: number
  details: HistoryDetails
  respondentName?: string | null
  answeredOn?: Day
  /** Null when a carer without an account answers. */
  byId: string | null
  /** Name of the part of the request body that holds the details, for messages beside a field. */
  part?: string
}

/**
 * Saves the answers so far and raises the red flags that they show, at once and in the same transaction. Refuses (422)
 * days that cannot be and (409 `closed`) a history that was sent; throws StaleWrite. Of one that the clinic asked for the
 * caller records who saved: the entry of the request, or of its link, says it.
 */
export const saveHistory = async (
  tx: Tx,
  record: Record,
  { history, version, details, respondentName, answeredOn, byId, part = 'details' }: HistorySave,
): Promise<void> => {
  if (history.lockedAt !== null) throw historyClosed()
  const child = await childOf(tx, history.childId)
  const problems = historyDayProblems(details, child)
  if (Object.keys(problems).length > 0)
    throw invalid(
      Object.fromEntries(Object.entries(problems).map(([field, problem]) => [`${part}.${field}`, problem])),
    )
  await updateIfCurrent(tx, History, history.id, version, {
    details,
    ...(respondentName !== undefined && { respondentName }),
    ...(answeredOn !== undefined && { answeredOn }),
  })
  if (history.requestId === null) record(historyFact(history, 'changed'))
  const flags = redFlagsOfHistory(details, child)
  const fresh = newlyRaised(redFlagsOfHistory(history.details, child), flags).map(({ id }) => id)
  await raiseFlags(tx, record, {
    childId: history.childId,
    origin: 'history',
    originId: history.id,
    flags,
    fresh,
    raisedById: byId,
    relation: relationTo(history),
  })
  await raiseInWords(tx, record, history, flagsInHistoryWords(details, history.details), byId)
}

/** A therapist writes down what was told and raises signs by hand; only a family's own words are read for them. */
const raiseInWords = async (
  tx: Tx,
  record: Record,
  history: History,
  found: readonly QuotedFlag[],
  raisedById: string | null,
): Promise<void> => {
  if (history.informant !== 'guardian') return
  const { childId, id: originId } = history
  const relation = relationTo(history)
  await raiseWrittenFlags(tx, record, {
    childId,
    origin: 'history',
    originId,
    found,
    writer: 'family',
    raisedById,
    relation,
  })
}

/**
 * Closes a history for good. What is not answered may stay so; what the child enjoys may not (422), and a history
 * without any answer is none. Throws StaleWrite when `version` is not the stored one.
 */
export const lockHistory = async (
  tx: Tx,
  record: Record,
  {
    history,
    version,
    lockedById,
    part = 'details',
  }: { history: History; version: number; lockedById: string | null; part?: string },
): Promise<void> => {
  if (history.lockedAt !== null) throw historyClosed()
  if (history.details.enjoys === null)
    throw invalid({
      [`${part}.enjoys`]: 'Write what the child enjoys first: letters and goals begin with it',
    })
  await updateIfCurrent(tx, History, history.id, version, { lockedAt: now(), lockedById })
  record(historyFact(history, 'locked'))
  await raiseFlags(tx, record, {
    childId: history.childId,
    origin: 'history',
    originId: history.id,
    flags: redFlagsOfHistory(history.details, await childOf(tx, history.childId)),
    raisedById: lockedById,
    relation: relationTo(history),
  })
  await raiseInWords(tx, record, history, flagsInHistoryWords(history.details), lockedById)
}

interface KnownChild {
  birthDate: Day
  today: Day
  ageMonths: number
  writingHand: WritingHand | null
}

const childOf = async (tx: Tx, childId: string): Promise<KnownChild> => {
  const child = await selectOne<{ birthDate: Day; writingHand: WritingHand | null }>(
    'SELECT c.birthDate, c.writingHand FROM children c WHERE c.id = :childId',
    { childId },
    tx,
  )
  if (!child) throw notFound()
  const today = clinicToday(await readSettings(tx))
  return { ...child, today, ageMonths: ageInMonths(child.birthDate, today) }
}

export const historyClosed = () =>
  conflict(
    'closed',
    'This history was signed or sent and stays as it is. To correct it, start a new one that replaces it.',
  )
