import { randomUUID } from 'node:crypto'
import type { MeasureDetails, MeasureKind, SkillTrial } from '../../shared/measures.ts'
import { emptyDetails, methodVersions, scoreMeasure } from '../../shared/measureScores.ts'
import { reachOrder } from '../../shared/reaching.ts'
import type { Hand } from '../../shared/roles.ts'
import { now } from '../../server/clock.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Measure } from '../../server/entities/Measure.ts'
import type { User } from '../../server/entities/User.ts'
import { insertRow } from './insertRow.ts'
import { seenOn } from './records.ts'

/** A whole occasion of reaching; `handAt` names the hand at each place, null for a lost card. */
export const reachingDetails = (
  handAt: (place: number) => Hand | null = () => 'left',
  seed = 20_260_609,
): MeasureDetails => ({
  kind: 'reaching',
  cardsPerPlace: 3,
  seed,
  reaches: reachOrder(seed, 3).map((place) => ({ place, hand: handAt(place), swapped: false })),
})

export const trial = (hand: Hand, value: number | null, more: Partial<SkillTrial> = {}): SkillTrial => ({
  hand,
  value,
  interrupted: false,
  confirmed: false,
  ...more,
})

/** Ten pegs, three trials a hand, in seconds. */
export const pegsDetails = (left: readonly number[], right: readonly number[]): MeasureDetails => ({
  kind: 'pegs',
  startHand: 'left',
  pegs: 10,
  seconds: null,
  trials: [...left.map((value) => trial('left', value)), ...right.map((value) => trial('right', value))],
})

interface Given extends Partial<Measure> {
  locked: boolean
  kind: MeasureKind
}

export const buildMeasure = (
  child: Pick<Child, 'id'>,
  by: Pick<User, 'id'>,
  { locked, kind, details = emptyDetails(kind, {}, 1), ...given }: Given,
): Promise<Measure> =>
  insertRow(Measure, {
    id: randomUUID(),
    childId: child.id,
    kind,
    methodVersion: methodVersions[kind],
    measuredOn: seenOn(),
    details,
    score: locked ? scoreMeasure(details) : null,
    notDoneReason: null,
    comment: null,
    startedById: by.id,
    lockedAt: locked ? now() : null,
    lockedById: locked ? by.id : null,
    replacesId: null,
    createdAt: now(),
    ...given,
  })
