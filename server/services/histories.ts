import { randomUUID } from 'node:crypto'
import { ageInMonths, type Day } from '../../shared/days.ts'
import type { WritingHand } from '../../shared/children.ts'
import {
  emptyHistory,
  historyDayProblems,
  type HistoryDetails,
  type HistoryDraft,
  type HistoryInformant,
  type HistoryStart,
} from '../../shared/histories.ts'
import { newlyRaised } from '../../shared/redFlags.ts'
import { redFlagsOfHistory } from '../../shared/redFlagSources.ts'
import type { ChildRelation } from '../../shared/roles.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { History } from '../entities/History.ts'
import { conflict, invalid, notFound } from '../errors.ts'
import { findHistory, type HistoryRecord } from '../queries/histories.ts'
import { findForChild } from '../queries/scope.ts'
import { selectOne } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { requireConsent, requirePastDay } from './recordRules.ts'
import { raiseFlags } from './redFlags.ts'
import { clinicToday, readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { StaleWrite, updateIfCurrent } from './versions.ts'

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

const historyFact = (
  history: { id: string; childId: string; informant: HistoryInformant },
  action: string,
): AuditFact => ({
  action: `history.${action}`,
  objectType: 'history',
  objectId: history.id,
  childId: history.childId,
  relation: relationTo(history),
})

const insertHistory = async (tx: Tx, id: string, details: HistoryDetails, begun: NewHistory) => {
  await tx.insert(History, { ...begun, id, details, lockedAt: null, lockedById: null, createdAt: now() })
}

/** Begins a history in which nothing is answered. Answers its id; its version is 1. The caller checks consent. */
export const beginHistory = async (tx: Tx, record: Record, begun: NewHistory): Promise<string> => {
  const id = randomUUID()
  await insertHistory(tx, id, emptyHistory, begun)
  record(historyFact({ ...begun, id }, 'started'))
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
 * days that cannot be and (409 `closed`) a history that was sent; throws StaleWrite.
 */
export const saveHistory = async (
  tx: Tx,
  record: Record,
  { history, version, details, respondentName, answeredOn, byId, part = 'details' }: HistorySave,
): Promise<void> => {
  if (history.lockedAt !== null) throw closed()
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
  record(historyFact(history, 'changed'))
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
  if (history.lockedAt !== null) throw closed()
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

const closed = () =>
  conflict(
    'closed',
    'This history was sent and stays as it is. To correct it, start a new one that replaces it.',
  )

const checkReplaced = async (tx: Tx, access: ChildAccess, replacesId: string): Promise<HistoryDetails> => {
  const earlier = await findForChild(access, History, replacesId, tx, { lock: true })
  if (earlier.lockedAt === null)
    throw conflict('not_locked', 'Only a history that was closed is replaced. This one can still be changed.')
  // A locking read: the newest row counts, not the one this transaction saw first.
  const newer = await selectOne(
    'SELECT id FROM histories WHERE replacesId = :replacesId FOR UPDATE',
    { replacesId },
    tx,
  )
  if (newer) throw conflict('duplicate', 'A history that replaces this one was already begun. Open that one.')
  return earlier.details
}

/** A therapist begins to write down what was told; one that replaces another starts with its answers. Answers its id. */
export const startHistory = async (
  actor: Actor,
  access: ChildAccess,
  { respondentName, answeredOn, replacesId }: HistoryStart,
  key: string | null,
): Promise<string> => {
  await requirePastDay(access, 'answeredOn', 'The date it was told', answeredOn)
  return transact(actor, (tx, record) => {
    const request = ['history', access.childId, { respondentName, answeredOn, replacesId }]
    const factOf = (id: string) =>
      historyFact({ id, childId: access.childId, informant: 'therapist' }, 'started')
    return createOnce(tx, actor, record, { key, request }, factOf, async (id) => {
      await requireConsent(tx, access, 'assessment_treatment')
      const details = replacesId === null ? emptyHistory : await checkReplaced(tx, access, replacesId)
      await insertHistory(tx, id, details, {
        childId: access.childId,
        informant: 'therapist',
        respondentName,
        answeredOn,
        requestId: null,
        guardianId: null,
        startedById: access.viewer.id,
        replacesId,
      })
    })
  })
}

/** The therapist's own page: a history that a carer is still answering is read only here. */
const openHistory = async (tx: Tx, access: ChildAccess, id: string): Promise<History> => {
  const history = await findForChild(access, History, id, tx, { lock: true })
  if (history.lockedAt !== null) throw closed()
  if (history.informant === 'guardian')
    throw conflict(
      'family_answers',
      'The family is answering this history. It can be changed by them alone until it is sent.',
    )
  return history
}

/** Saves a therapist's page and answers it as this save left it. Throws StaleWrite. */
export const changeHistory = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
  { respondentName, answeredOn, details }: HistoryDraft,
): Promise<HistoryRecord> => {
  await requirePastDay(access, 'answeredOn', 'The date it was told', answeredOn)
  return transact(actor, async (tx, record) => {
    const history = await openHistory(tx, access, id)
    await saveHistory(tx, record, {
      history,
      version,
      details,
      respondentName,
      answeredOn,
      byId: access.viewer.id,
    })
    return findHistory(access, id, tx)
  })
}

/** Closes a therapist's history. Throws StaleWrite. */
export const closeHistory = (actor: Actor, access: ChildAccess, id: string, version: number): Promise<void> =>
  transact(actor, async (tx, record) => {
    const history = await openHistory(tx, access, id)
    await requireConsent(tx, access, 'assessment_treatment')
    await lockHistory(tx, record, { history, version, lockedById: access.viewer.id })
  })

/**
 * Removes a history that a therapist began and never closed. What it raised stays on the record. Throws StaleWrite when
 * somebody wrote in it in between.
 */
export const discardHistory = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const history = await openHistory(tx, access, id)
    if (history.version !== version) throw new StaleWrite()
    await tx.delete(History, id)
    record(historyFact(history, 'discarded'))
  })
