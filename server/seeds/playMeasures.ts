import type { Day } from '../../shared/days.ts'
import type { MeasureDetails, Reach, ReachingDetails } from '../../shared/measures.ts'
import { reachOrder } from '../../shared/reaching.ts'
import { database } from '../dataSource.ts'
import { Measure } from '../entities/Measure.ts'
import { lockMeasure, saveMeasure, startMeasure } from '../services/measures.ts'
import type { DemoMeasure, DemoReaching } from './demo/assessmentTypes.ts'
import { acting, type Scene } from './playScene.ts'

/** The reaches in the order in which the seed lays the cards out. */
const inOrder = ({ seed, reached }: DemoReaching): ReachingDetails => {
  const cardsPerPlace = 3
  const taken = new Map<number, number>()
  const reaches = reachOrder(seed, cardsPerPlace).map((place): Reach => {
    const index = taken.get(place) ?? 0
    taken.set(place, index + 1)
    const reach = reached[place][index]
    if (!reach) throw new Error(`Place ${place} of a demo reaching needs ${cardsPerPlace} cards`)
    return { place, ...reach }
  })
  return { kind: 'reaching', cardsPerPlace, seed, reaches }
}

export const measured = (details: DemoMeasure['details']): MeasureDetails =>
  details.kind === 'reaching' ? inOrder(details) : details

const optionsOf = (details: MeasureDetails) =>
  'trials' in details ? { startHand: details.startHand, pegs: details.pegs, seconds: details.seconds } : {}

export const playMeasure = async (
  scene: Scene,
  number: number,
  { details: demo, by, notDoneReason, comment }: DemoMeasure,
  on: Day,
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  const details = measured(demo)
  const start = { kind: details.kind, measuredOn: on, replacesId: null, options: optionsOf(details) }
  const id = await startMeasure(actor, access, start, null, () =>
    details.kind === 'reaching' ? details.seed : 0,
  )
  const { version } = await database().manager.findOneByOrFail(Measure, { id })
  const saved = await saveMeasure(actor, access, id, version, {
    measuredOn: on,
    details,
    notDoneReason,
    comment,
  })
  await lockMeasure(actor, access, id, saved.version)
}
