import { randomUUID } from 'node:crypto'
import type { Day } from '../../shared/days.ts'
import {
  closedStates,
  episodeStateLabels,
  isOpen,
  type EpisodeState,
  type StateChange,
} from '../../shared/episodes.ts'
import type { Priority } from '../../shared/referrals.ts'
import { reviewDateAfter } from '../../shared/reviewDates.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Child } from '../entities/Child.ts'
import { Episode } from '../entities/Episode.ts'
import { EpisodeChange } from '../entities/EpisodeChange.ts'
import { conflict, invalid } from '../errors.ts'
import { stateChoices } from '../policies/children.ts'
import { isConsentGiven } from '../queries/childFacts.ts'
import { findEpisode, type EpisodeRow } from '../queries/episodes.ts'
import { lockChild } from '../queries/lockChild.ts'
import { selectOne } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { requireNoBookingHold } from './bookingHold.ts'
import { requireConsent } from './recordRules.ts'
import { clinicToday, readSettings } from './settings.ts'
import { transact } from './transact.ts'
import { StaleWrite, updateIfCurrent } from './versions.ts'

export interface NewEpisode {
  childId: string
  referralId: string
  receivedOn: Day
  priority: Priority
  /** The states it passes at once; it stays in the last one. */
  path: readonly [EpisodeState, ...EpisodeState[]]
  reason: string
  byId: string
}

/** Opens an episode of care and keeps each state it passed. */
export const openEpisode = async (
  tx: Tx,
  { childId, referralId, receivedOn, priority, path, reason, byId }: NewEpisode,
): Promise<string> => {
  const id = randomUUID()
  await tx.insert(Episode, {
    id,
    childId,
    referralId,
    state: path.at(-1),
    receivedOn,
    priority,
    firstSeenOn: null,
    closedOn: null,
    createdAt: now(),
  })
  for (const [index, state] of path.entries())
    await tx.insert(EpisodeChange, {
      id: randomUUID(),
      episodeId: id,
      fromState: path[index - 1] ?? null,
      toState: state,
      reason,
      byId,
      // Changes of one moment keep their order.
      at: new Date(now().getTime() + index),
    })
  return id
}

/** The child's open episode, locked; null when none is. */
export const lockOpenEpisode = (
  tx: Tx,
  childId: string,
): Promise<Pick<Episode, 'id' | 'state' | 'version'> | null> =>
  selectOne(
    `SELECT e.id, e.state, e.version FROM episodes e WHERE e.childId = :childId AND e.state NOT IN (:closed)
     ORDER BY e.receivedOn DESC, e.createdAt DESC, e.id LIMIT 1 FOR UPDATE`,
    { childId, closed: closedStates },
    tx,
  )

/** States in which the clinic works with the child; each needs consent to assessment and therapy. */
const statesWithChild: readonly EpisodeState[] = ['consented', 'assessing', 'formulated', 'active', 'review']

/** Writes one step of an episode: the new state, who, when and why, and the review that follows from it. */
const moveEpisode = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  access: ChildAccess,
  episode: EpisodeRow,
  { to, reason, settings }: StateChange & { settings: ClinicSettings },
): Promise<void> => {
  const today = clinicToday(settings)
  await updateIfCurrent(tx, Episode, episode.id, episode.version, {
    state: to,
    firstSeenOn: to === 'assessing' ? (episode.firstSeenOn ?? today) : episode.firstSeenOn,
    closedOn: isOpen(to) ? null : today,
  })
  await tx.insert(EpisodeChange, {
    id: randomUUID(),
    episodeId: episode.id,
    fromState: episode.state,
    toState: to,
    reason,
    byId: access.viewer.id,
    at: now(),
  })
  await moveReview(tx, access, { from: episode.state, to, today, reviewWeeks: settings.reviewWeeks })
  record({
    action: 'episode.state_changed',
    objectType: 'episode',
    objectId: episode.id,
    childId: access.childId,
    relation: access.relation,
    detail: { from: episode.state, to },
  })
}

/**
 * Moves the child's episode on and keeps who, when and why. The wait ends when the assessment begins; the next review
 * follows the clinic's interval. 409 `closed` for a closed episode, 409 `consent_needed` without consent,
 * 409 `booking_held` for therapy while a warning sign comes first; throws StaleWrite when somebody moved it in between.
 */
export const changeState = async (
  actor: Actor,
  access: ChildAccess,
  version: number,
  { to, reason }: StateChange,
): Promise<void> => {
  const settings = await readSettings()
  await transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    const episode = await findEpisode(access, tx)
    if (!episode || !isOpen(episode.state))
      throw conflict('closed', 'This episode is closed. A new referral opens a new one.')
    if (episode.version !== version) throw new StaleWrite()
    if (!stateChoices(access, episode.state).includes(to))
      throw invalid({
        to: `“${episodeStateLabels[to]}” cannot follow “${episodeStateLabels[episode.state]}” here`,
      })
    if (statesWithChild.includes(to)) await requireConsent(tx, access, 'assessment_treatment')
    if (to === 'active') await requireNoBookingHold(tx, access)
    await moveEpisode(tx, record, access, episode, { to, reason, settings })
  })
}

/**
 * An assessment ends with its signed conclusion: the episode moves on from “assessing”, in the transaction of the
 * signature. An episode elsewhere stays where it is, and so does one whose family took its consent back: what was
 * concluded is kept, and the work with the child does not go on by itself.
 */
export const closeAssessment = async (
  tx: Tx,
  record: (fact: AuditFact) => void,
  access: ChildAccess,
  settings: ClinicSettings,
): Promise<void> => {
  const episode = await findEpisode(access, tx)
  if (episode?.state !== 'assessing' || !stateChoices(access, episode.state).includes('formulated')) return
  if (!(await isConsentGiven(access, 'assessment_treatment', tx))) return
  const reason = 'The conclusion of the assessment was signed'
  await moveEpisode(tx, record, access, episode, { to: 'formulated', reason, settings })
}

const moveReview = async (
  tx: Tx,
  { childId }: ChildAccess,
  step: Omit<Parameters<typeof reviewDateAfter>[0], 'nextReviewOn'>,
) => {
  const child = await tx.findOneByOrFail(Child, { id: childId })
  const nextReviewOn = reviewDateAfter({ ...step, nextReviewOn: child.nextReviewOn })
  if (nextReviewOn !== child.nextReviewOn)
    await updateIfCurrent(tx, Child, childId, child.version, { nextReviewOn })
}
