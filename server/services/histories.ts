import {
  emptyHistory,
  type HistoryDetails,
  type HistoryDraft,
  type HistoryStart,
} from '../../shared/histories.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { History } from '../entities/History.ts'
import { conflict } from '../errors.ts'
import { hasRequestEnded } from '../queries/answerRequests.ts'
import { findHistory, type HistoryRecord } from '../queries/histories.ts'
import { findForChild } from '../queries/scope.ts'
import { selectOne } from '../queries/sql.ts'
import { historyClosed, historyFact, insertHistory, lockHistory, saveHistory } from './historyStore.ts'
import { createOnce } from './once.ts'
import { requestEnded, requireConsent, requirePastDay } from './recordRules.ts'
import { transact } from './transact.ts'
import { StaleWrite } from './versions.ts'

const checkReplaced = async (tx: Tx, access: ChildAccess, replacesId: string): Promise<HistoryDetails> => {
  const earlier = await findForChild(access, History, replacesId, tx, { lock: true })
  if (earlier.lockedAt === null)
    throw conflict(
      'not_locked',
      'Only a history that was signed or sent is replaced. This one can still be changed.',
    )
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

const unlockedHistory = async (tx: Tx, access: ChildAccess, id: string): Promise<History> => {
  const history = await findForChild(access, History, id, tx, { lock: true })
  if (history.lockedAt !== null) throw historyClosed()
  return history
}

const isLeftOver = async ({ requestId }: History, tx: Tx): Promise<boolean> =>
  requestId !== null && (await hasRequestEnded(requestId, tx))

const familyAnswers = () =>
  conflict(
    'family_answers',
    'The family is answering this history. It can be changed by them alone until it is sent.',
  )

/** The therapist's own page: a history that a carer is still answering is read only here. */
const openHistory = async (tx: Tx, access: ChildAccess, id: string): Promise<History> => {
  const history = await unlockedHistory(tx, access, id)
  if (history.informant !== 'guardian') return history
  if (await isLeftOver(history, tx)) throw requestEnded()
  throw familyAnswers()
}

/** The history to throw away: begun by a therapist, or left over from a request that ended. */
const discardableHistory = async (tx: Tx, access: ChildAccess, id: string): Promise<History> => {
  const history = await unlockedHistory(tx, access, id)
  if (history.informant === 'guardian' && !(await isLeftOver(history, tx))) throw familyAnswers()
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
 * Removes a history that a therapist began and never closed, or that a family can no longer send. What it raised stays on
 * the record. Throws StaleWrite when somebody wrote in it in between.
 */
export const discardHistory = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const history = await discardableHistory(tx, access, id)
    if (history.version !== version) throw new StaleWrite()
    await tx.delete(History, id)
    record({ ...historyFact(history, 'discarded'), relation: access.relation })
  })
