import { randomInt } from 'node:crypto'
import { daysBetween, formatDay, type Day } from '../../shared/days.ts'
import { seedLimit, type MeasureDraft, type MeasureStart } from '../../shared/measureSchemas.ts'
import { emptyDetails, lockProblems, methodVersions, scoreMeasure } from '../../shared/measureScores.ts'
import {
  measureKindLabels,
  skillKinds,
  type MeasureDetails,
  type MeasureScore,
  type SkillScore,
} from '../../shared/measures.ts'
import { redFlagsOfSkill } from '../../shared/redFlagSources.ts'
import type { HandSkill } from '../../shared/skillGap.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Measure } from '../entities/Measure.ts'
import { conflict, invalid } from '../errors.ts'
import { lockChild } from '../queries/lockChild.ts'
import { findMeasure, openMeasureOf, type MeasureRecord } from '../queries/measures.ts'
import { findChildFacts } from '../queries/childFacts.ts'
import { listLockedHandEvidence } from '../queries/handEvidence.ts'
import { findForChild } from '../queries/scope.ts'
import { selectOne } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { raiseFlags } from './redFlags.ts'
import { requireConsent, requirePastDay } from './recordRules.ts'
import { transact } from './transact.ts'
import { StaleWrite, updateIfCurrent } from './versions.ts'

const fact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action: `measure.${action}`,
  objectType: 'measure',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

const closed = () =>
  conflict(
    'closed',
    'This measure is signed and stays as it is. To correct it, start a new version that replaces it.',
  )

/** The measure for writing; locked ones are refused here and, should this ever fail, by a trigger. */
const openMeasure = async (tx: Tx, access: ChildAccess, id: string): Promise<Measure> => {
  const measure = await findForChild(access, Measure, id, tx, { lock: true })
  if (measure.lockedAt !== null) throw closed()
  return measure
}

/** The locked measure that a new version corrects. */
const replacedBy = async (tx: Tx, access: ChildAccess, { kind, replacesId }: MeasureStart) => {
  if (replacesId === null) return null
  const earlier = await findForChild(access, Measure, replacesId, tx, { lock: true })
  if (earlier.kind !== kind)
    throw invalid({ replacesId: 'The earlier measure is of another kind, so it cannot be replaced by this.' })
  if (earlier.lockedAt === null)
    throw conflict('not_locked', 'Only a signed measure is replaced. This one can still be changed.')
  // A locking read: the newest row counts, not the one this transaction saw first.
  const newer = await selectOne(
    'SELECT id FROM measures WHERE replacesId = :replacesId FOR UPDATE',
    { replacesId },
    tx,
  )
  if (newer) throw conflict('duplicate', 'A version that replaces this one was already begun. Open that one.')
  return earlier
}

/** Two people who begin the same part for the same day are told, so that one occasion has one record. */
const refuseSecond = async (tx: Tx, access: ChildAccess, { kind, measuredOn }: MeasureStart) => {
  const open = await openMeasureOf(access, kind, measuredOn, tx)
  if (!open) return
  const what = `${measureKindLabels[kind]} of ${formatDay(measuredOn)}`
  throw conflict(
    'duplicate',
    `${what} was already begun by ${open.startedBy}. Open that one and go on there.`,
  )
}

/**
 * Begins a measure with nothing recorded; the order of cards is drawn here. A new version of a locked measure begins with
 * what that one holds, to be corrected. Answers its id.
 */
export const startMeasure = async (
  actor: Actor,
  access: ChildAccess,
  start: MeasureStart,
  key: string | null,
  drawSeed: () => number = () => randomInt(seedLimit),
): Promise<string> => {
  await requirePastDay(access, 'measuredOn', 'The date', start.measuredOn)
  return transact(actor, (tx, record) => {
    const request = ['measure', access.childId, start]
    const factOf = (id: string) => fact(access, 'started', id)
    return createOnce(tx, actor, record, { key, request }, factOf, async (newId) => {
      await requireConsent(tx, access, 'assessment_treatment')
      await lockChild(access, tx)
      const earlier = await replacedBy(tx, access, start)
      await refuseSecond(tx, access, start)
      await tx.insert(Measure, {
        id: newId,
        childId: access.childId,
        kind: start.kind,
        methodVersion: methodVersions[start.kind],
        measuredOn: start.measuredOn,
        details: earlier ? earlier.details : emptyDetails(start.kind, start.options ?? {}, drawSeed()),
        score: null,
        notDoneReason: earlier ? earlier.notDoneReason : null,
        comment: earlier ? earlier.comment : null,
        startedById: access.viewer.id,
        lockedAt: null,
        lockedById: null,
        replacesId: start.replacesId,
        createdAt: now(),
      })
    })
  })
}

/** What was drawn or chosen when the measure began stays as it was. */
const checkSame = (before: MeasureDetails, after: MeasureDetails): void => {
  if (before.kind !== after.kind)
    throw invalid({ details: 'This measure is of another kind. Reload the page.' })
  if (before.kind !== 'reaching' || after.kind !== 'reaching') return
  if (before.seed !== after.seed || before.cardsPerPlace !== after.cardsPerPlace)
    throw invalid({ details: 'The cards of this occasion were drawn in another order. Reload the page.' })
}

/** One occasion has one record: a measure does not move onto a day on which another of its kind is open. */
const refuseTakenDay = async (
  tx: Tx,
  access: ChildAccess,
  { kind, measuredOn: before }: Pick<Measure, 'kind' | 'measuredOn'>,
  measuredOn: Day,
) => {
  if (measuredOn === before) return
  const open = await openMeasureOf(access, kind, measuredOn, tx)
  if (open)
    throw invalid({
      measuredOn: `${measureKindLabels[kind]} of ${formatDay(measuredOn)} was begun by ${open.startedBy} and is open. Choose another day, or go on there.`,
    })
}

/** Saves the trials so far and answers them as this save left them. Throws StaleWrite when somebody saved in between. */
export const saveMeasure = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
  { measuredOn, details, notDoneReason, comment }: MeasureDraft,
): Promise<MeasureRecord> => {
  await requirePastDay(access, 'measuredOn', 'The date', measuredOn)
  return transact(actor, async (tx, record) => {
    // As where one is begun: the child first, so that nobody takes the day in between.
    await lockChild(access, tx)
    const measure = await openMeasure(tx, access, id)
    checkSame(measure.details, details)
    await refuseTakenDay(tx, access, measure, measuredOn)
    await updateIfCurrent(tx, Measure, id, version, { measuredOn, details, notDoneReason, comment })
    record(fact(access, 'changed', id))
    return findMeasure(access, id, tx)
  })
}

/** Days within which tasks of skill are taken together (clinic rule): hands of a child change. */
const daysTogether = 183

const isSkill = (score: MeasureScore): score is SkillScore => skillKinds.some((kind) => kind === score.kind)

const skillOf = ({ kind, index, interval, left, right }: SkillScore): HandSkill => {
  const trials = Math.min(left.trials, right.trials)
  return { kind, task: measureKindLabels[kind], trials, index, interval }
}

/**
 * A hand that does not write and clearly does better asks for a full look; nothing else here is a warning sign. Read with
 * the newest of the other tasks of skill, as some count only together; a gap that this task is no part of stands already.
 */
const flagsOf = async (
  access: ChildAccess,
  { score, measuredOn }: { score: MeasureScore; measuredOn: Day },
  tx: Tx,
) => {
  if (!isSkill(score)) return []
  const { writingHand } = await findChildFacts(access, tx)
  const { measures } = await listLockedHandEvidence(access, tx)
  const others = measures.flatMap((measure) =>
    isSkill(measure.score) &&
    measure.score.kind !== score.kind &&
    measure.notDoneReason === null &&
    Math.abs(daysBetween(measure.measuredOn, measuredOn)) <= daysTogether
      ? [skillOf(measure.score)]
      : [],
  )
  // The list begins with the newest.
  const newest = others.filter(({ kind }, at) => others.findIndex((other) => other.kind === kind) === at)
  const own = skillOf(score)
  // In one order whichever was locked last, so that the same gap has the same words.
  const together = [own, ...newest].toSorted(
    (a, b) => skillKinds.indexOf(a.kind) - skillKinds.indexOf(b.kind),
  )
  return redFlagsOfSkill(together, writingHand).filter(({ signs }) => signs.includes(own.task))
}

/**
 * Locks a measure and stores its score with the version of the method, computed here from the stored trials: no figure of
 * the browser is used. Something must be recorded, or a reason given why it was not done. Throws StaleWrite.
 */
export const lockMeasure = (actor: Actor, access: ChildAccess, id: string, version: number): Promise<void> =>
  transact(actor, async (tx, record) => {
    const { kind, details, notDoneReason, measuredOn } = await openMeasure(tx, access, id)
    await requireConsent(tx, access, 'assessment_treatment')
    const problems = lockProblems(details, notDoneReason)
    if (Object.keys(problems).length > 0) throw invalid(problems)
    const score = scoreMeasure(details)
    await updateIfCurrent(tx, Measure, id, version, {
      methodVersion: methodVersions[kind],
      score,
      lockedAt: now(),
      lockedById: access.viewer.id,
    })
    record(fact(access, 'locked', id))
    const { childId, viewer } = access
    const flags = await flagsOf(access, { score, measuredOn }, tx)
    await raiseFlags(tx, record, {
      childId,
      origin: 'measure',
      originId: id,
      flags,
      fresh: flags.map((flag) => flag.id),
      raisedById: viewer.id,
      relation: access.relation,
    })
  })

/** Removes a measure that was begun and never locked. Throws StaleWrite when somebody recorded in it in between. */
export const discardMeasure = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const measure = await openMeasure(tx, access, id)
    if (measure.version !== version) throw new StaleWrite()
    await tx.delete(Measure, id)
    record(fact(access, 'discarded', id))
  })
