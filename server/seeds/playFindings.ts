import { addDays, type Day } from '../../shared/days.ts'
import { database } from '../dataSource.ts'
import { Goal } from '../entities/Goal.ts'
import { addObservation } from '../services/writingObservations.ts'
import { createGoal, endGoal, rateGoal } from '../services/goals.ts'
import { addSample, removeSample } from '../services/samples.ts'
import type { DemoGoal, DemoObservation, DemoSample } from './demo/demoTypes.ts'
import type { StaffKey } from './demo/people.ts'
import { drawSample } from './drawSample.ts'
import { acting, idIn, storyOf, type Scene } from './playScene.ts'

export const playObservation = async (
  scene: Scene,
  number: number,
  observation: DemoObservation,
  on: Day,
): Promise<void> => {
  const { child: _child, observedDay: _day, by, ...details } = observation
  const { actor, access } = await acting(scene, number, by)
  await addObservation(actor, access, { ...details, observedOn: on }, null)
}

export const playSample = async (
  scene: Scene,
  number: number,
  { sample, index, on }: { sample: DemoSample; index: number; on: Day },
): Promise<void> => {
  const { actor, access } = await acting(scene, number, sample.by)
  const buffer = await (scene.drawings.get(sample) ?? drawSample(sample.drawing))
  scene.drawings.delete(sample)
  const file = { originalname: 'writing.png', mimetype: 'image/png', buffer }
  const id = await addSample(actor, access, { ...sample.details, takenOn: on }, file, null)
  storyOf(scene, number).sampleIds.set(index, id)
}

export const playSampleRemoval = async (
  scene: Scene,
  number: number,
  index: number,
  by: StaffKey,
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  await removeSample(actor, access, idIn(storyOf(scene, number).sampleIds, index))
}

export const playGoal = async (
  scene: Scene,
  number: number,
  { goal, index, demoToday }: { goal: DemoGoal; index: number; demoToday: Day },
): Promise<void> => {
  const { actor, access } = await acting(scene, number, goal.by)
  const { targetDay, ...details } = goal.details
  const id = await createGoal(actor, access, { ...details, targetOn: addDays(demoToday, targetDay) }, null)
  storyOf(scene, number).goalIds.set(index, id)
}

export const playRating = async (
  scene: Scene,
  number: number,
  { index, rating, by, on }: { index: number; rating: DemoGoal['ratings'][number]; by: StaffKey; on: Day },
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  const goalId = idIn(storyOf(scene, number).goalIds, index)
  await rateGoal(actor, access, goalId, { level: rating.level, ratedOn: on, note: rating.note }, null)
}

export const playGoalEnd = async (
  scene: Scene,
  number: number,
  {
    index,
    by,
    outcome,
    reason,
  }: { index: number; by: StaffKey; outcome: 'finished' | 'set_aside'; reason: string },
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  const goalId = idIn(storyOf(scene, number).goalIds, index)
  const { version } = await database().manager.findOneByOrFail(Goal, { id: goalId })
  await endGoal(actor, access, goalId, version, { outcome, reason })
}
