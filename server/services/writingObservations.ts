import { ageInMonths } from '../../shared/days.ts'
import { newlyRaised } from '../../shared/redFlags.ts'
import { redFlagsOfObservation } from '../../shared/redFlagSources.ts'
import type { WritingObservationDetails } from '../../shared/writingObservations.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import { WritingObservation } from '../entities/WritingObservation.ts'
import { invalid } from '../errors.ts'
import { findChildFacts } from '../queries/childFacts.ts'
import { findObservationBefore } from '../queries/writingObservations.ts'
import { createOnce } from './once.ts'
import { requireConsent, requirePastDay } from './recordRules.ts'
import { raiseFlags } from './redFlags.ts'
import { transact } from './transact.ts'

const nothingSeen = ({ observedOn: _day, ...seen }: WritingObservationDetails): boolean =>
  Object.values(seen).every((value) => value === null)

/** Keeps what was seen on one day; it is never changed. Answers its id. */
export const addObservation = async (
  actor: Actor,
  access: ChildAccess,
  details: WritingObservationDetails,
  key: string | null,
): Promise<string> => {
  await requirePastDay(access, 'observedOn', 'The date', details.observedOn)
  if (nothingSeen(details))
    throw invalid({ form: 'Nothing is filled in yet: enter at least one thing you saw.' })
  return transact(actor, (tx, record) => {
    const request = ['writingObservation', access.childId, details]
    const factOf = (id: string) => ({
      action: 'writingObservation.added',
      objectType: 'writingObservation',
      objectId: id,
      childId: access.childId,
      relation: access.relation,
    })
    return createOnce(tx, actor, record, { key, request }, factOf, async (observationId) => {
      await requireConsent(tx, access, 'assessment_treatment')
      await tx.insert(WritingObservation, {
        id: observationId,
        childId: access.childId,
        observedOn: details.observedOn,
        details,
        observedById: access.viewer.id,
        recordedAt: now(),
      })
      const { birthDate, writingHand } = await findChildFacts(access, tx)
      const flagsOf = (seen: WritingObservationDetails) =>
        redFlagsOfObservation(seen, { ageMonths: ageInMonths(birthDate, seen.observedOn), writingHand })
      const flags = flagsOf(details)
      const before = await findObservationBefore(access, observationId, tx)
      await raiseFlags(tx, record, {
        childId: access.childId,
        origin: 'observation',
        originId: observationId,
        flags,
        // Worse pain than last time is added to a sign that stands already.
        fresh: newlyRaised(before === null ? [] : flagsOf(before.details), flags).map(({ id }) => id),
        raisedById: access.viewer.id,
        relation: access.relation,
      })
    })
  })
}
