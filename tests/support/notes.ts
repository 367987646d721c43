import { randomUUID } from 'node:crypto'
import { now } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import { Assignment } from '../../server/entities/Assignment.ts'
import type { Child } from '../../server/entities/Child.ts'
import type { User } from '../../server/entities/User.ts'
import type { NoteDraft } from '../../shared/sessionNotes.ts'

/** A draft with every part filled, for a session on 10 Jun 2026 at ten. */
export const noteDraft = (given: Partial<NoteDraft> = {}): NoteDraft => ({
  heldOn: '2026-06-10',
  startTime: '10:00',
  minutes: 45,
  type: 'session',
  present: 'Mother',
  assent: 'willing',
  said: '“It smudges less.”',
  observed: 'Wrote five lines with the page turned 20 degrees.',
  meaning: 'The tilt clears the hand from the line.',
  plan: 'Same tilt at school; look again in two weeks.',
  goalIds: [],
  ...given,
})

/** A second therapist who holds the child beside the first. */
export const alsoHeldBy = (child: Pick<Child, 'id'>, therapist: User) =>
  database().manager.insert(Assignment, {
    id: randomUUID(),
    childId: child.id,
    therapistId: therapist.id,
    startedAt: now(),
    endedAt: null,
    reason: 'shared',
  })
