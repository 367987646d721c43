import { consentProblem } from '../../../shared/consentRules.ts'
import type { Day } from '../../../shared/days.ts'
import { referralFlagsOf, type ReferralFlag } from '../../../shared/referralFlags.ts'
import type { AcceptReferral } from '../../../shared/referrals.ts'
import type { Actor, Viewer } from '../../access/actor.ts'
import { now } from '../../clock.ts'
import type { Tx } from '../../dataSource.ts'
import type { Guardian } from '../../entities/Guardian.ts'
import { Referral } from '../../entities/Referral.ts'
import { invalid } from '../../errors.ts'
import { canAllocateTo, isLead } from '../../policies/referrals.ts'
import { raiseReferralFlags } from '../alerts.ts'
import { assertCanHold, assign, currentTherapist } from '../assignments.ts'
import type { AuditFact } from '../audit.ts'
import { insertConsent } from '../consents.ts'
import { lockOpenEpisode, openEpisode } from '../episodes.ts'
import { clinicToday, readSettings } from '../settings.ts'
import { transact } from '../transact.ts'
import { updateIfCurrent } from '../versions.ts'
import { createChild, joinChild } from './child.ts'
import { lockUndecided } from './enter.ts'

type Record = (fact: AuditFact) => void

/**
 * Accepts a referral in one transaction: the child's record with its number, carers, episode of care, consents, warning
 * signs and, when chosen, the therapist. With `existingChildId` the referral joins that child instead; a child whose
 * episode is still open keeps it. Answers the child's id. Throws StaleWrite, and SameChildKnown before a second record.
 */
export const acceptReferral = async (
  actor: Actor,
  viewer: Viewer,
  id: string,
  version: number,
  decision: AcceptReferral,
): Promise<string> => {
  const settings = await readSettings()
  const today = clinicToday(settings)
  return transact(actor, async (tx, record) => {
    const referral = await lockUndecided(tx, viewer, id, version)
    const flags = referralFlagsOf(referral.details)
    assertDecision(viewer, decision, flags)
    if (decision.therapistId !== null) await assertCanHold(tx, decision.existingChildId, decision.therapistId)
    const { childId, guardians } =
      decision.existingChildId === null
        ? await createChild(tx, record, referral, decision)
        : await joinChild(tx, record, viewer, referral, decision.existingChildId)
    const open = await lockOpenEpisode(tx, childId)
    await giveConsents(tx, record, viewer, {
      childId,
      guardians,
      decision,
      today,
      timeZone: settings.timeZone,
    })
    await allocate(tx, record, viewer, childId, decision)
    const therapistId = await currentTherapist(tx, childId)
    if (!open)
      await openEpisode(tx, {
        childId,
        referralId: id,
        receivedOn: referral.receivedOn,
        priority: decision.priority,
        path: ['referred', 'triaged', startOf(decision, therapistId)],
        reason: decision.priorityReason ?? 'Referral accepted',
        byId: viewer.id,
      })
    await raiseReferralFlags(tx, record, { childId, therapistId, today }, flags)
    const status = open ? 'merged' : 'accepted'
    await updateIfCurrent(tx, Referral, id, version, {
      status,
      priority: decision.priority,
      childId,
      decidedById: viewer.id,
      decidedAt: now(),
      decisionReason: decision.priorityReason,
    })
    record({ action: `referral.${status}`, objectType: 'referral', objectId: id, childId })
    return childId
  })
}

/** With a therapist and consent the assessment can begin; otherwise the child waits. */
const startOf = ({ consents }: AcceptReferral, therapistId: string | null) =>
  therapistId !== null && consents.some((consent) => consent.purpose === 'assessment_treatment')
    ? 'consented'
    : 'waiting'

/** A warning sign keeps a routine place from being given in passing: a reason, and for the serious ones the lead. */
const assertDecision = (viewer: Viewer, decision: AcceptReferral, flags: readonly ReferralFlag[]) => {
  const { priority, priorityReason, therapistId } = decision
  if (priority === 'priority' && priorityReason === null)
    throw invalid({ priorityReason: 'Say why this child is seen first' })
  if (priority === 'routine' && flags.length > 0) {
    if (flags.some((flag) => flag.level === 'overdue') && !isLead(viewer))
      throw invalid({
        priority:
          'A serious warning sign stands on this referral: choose priority, or ask the clinic lead to decide',
      })
    if (priorityReason === null)
      throw invalid({ priorityReason: 'A warning sign stands on this referral: say why routine is right' })
  }
  if (therapistId !== null && !canAllocateTo(viewer, therapistId))
    throw invalid({
      therapistId: 'You can take this child yourself, or leave it to the clinic lead to choose a therapist',
    })
}

interface GivenConsents {
  childId: string
  guardians: readonly Guardian[]
  decision: AcceptReferral
  today: Day
  timeZone: string
}

const giveConsents = async (
  tx: Tx,
  record: Record,
  viewer: Viewer,
  { childId, guardians, decision, today, timeZone }: GivenConsents,
) => {
  const fields: { [field: string]: string } = {}
  const seen = new Set<string>()
  for (const [index, consent] of decision.consents.entries()) {
    const at = (field: string) => `consents[${index}].${field}`
    const carer = guardians[Number(consent.carer)]
    if (!carer) {
      fields[at('carer')] = 'This carer is not on the referral'
      continue
    }
    const problem = consentProblem(consent, carer, today)
    if (problem) fields[at(problem.field)] = problem.message
    else if (consent.method === 'signed_in')
      fields[at('method')] = 'Only carers themselves consent by signing in: choose how it was given'
    else if (seen.has(`${consent.purpose} ${carer.id}`))
      fields[at('purpose')] = 'This consent stands in the list twice'
    seen.add(`${consent.purpose} ${carer.id}`)
  }
  if (Object.keys(fields).length > 0) throw invalid(fields)
  for (const { carer, ...consent } of decision.consents) {
    const guardian = guardians[Number(carer)]
    if (!guardian) continue
    await insertConsent(tx, record, timeZone, {
      ...consent,
      childId,
      guardianId: guardian.id,
      givenByName: guardian.name,
      note: null,
      recordedById: viewer.id,
      relation: null,
    })
  }
}

const allocate = async (
  tx: Tx,
  record: Record,
  viewer: Viewer,
  childId: string,
  { therapistId, priorityReason }: AcceptReferral,
) => {
  if (therapistId === null) return
  const before = await currentTherapist(tx, childId)
  if (before !== null && before !== therapistId && !isLead(viewer))
    throw invalid({ therapistId: 'This child is with a colleague already: leave the therapist empty' })
  await assign(tx, record, {
    childId,
    therapistId,
    reason: priorityReason ?? 'Referral accepted',
    relation: null,
  })
}
