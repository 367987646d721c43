import { dayOf } from '../../shared/days.ts'
import { now, resetClock, setClock } from '../clock.ts'
import { systemActor } from '../access/actor.ts'
import { recordAudit } from '../services/audit.ts'
import { demoBegun, demoMade } from '../setup/halfMadeDemo.ts'
import { changeSettings } from '../services/settings.ts'
import { createClass, createSchool } from '../services/schools.ts'
import { clinicSettings } from './demo/clinic.ts'
import { children } from './demo/children.ts'
import { parents } from './demo/parents.ts'
import { staff, teachers } from './demo/people.ts'
import { schools, schoolYearOf, type ClassKey } from './demo/schools.ts'
import { demoTimeline } from './demo/timeline.ts'
import type { DemoEvent } from './demo/timelineTypes.ts'
import { drawSample } from './drawSample.ts'
import { playEvent } from './playEvent.ts'
import type { Scene } from './playScene.ts'
import { actorOf, seedPeople, type People } from './seedPeople.ts'

const seedSchools = async (people: People, schoolYear: number): Promise<Map<ClassKey, string>> => {
  const pauline = actorOf(people, 'pauline')
  const classes = new Map<ClassKey, string>()
  for (const school of schools) {
    const schoolId = await createSchool(pauline, { name: school.name, town: school.town }, null)
    const teacherId = actorOf(people, school.teacher).viewer.id
    for (const { key, name, ages } of school.classes)
      classes.set(key, await createClass(pauline, { schoolId, name, schoolYear, ages, teacherId }, null))
  }
  return classes
}

/** Drawing works in threads of its own, so it goes on while the story waits for the database. */
const drawAhead = (events: readonly DemoEvent[]): Scene['drawings'] => {
  const drawings: Scene['drawings'] = new Map()
  let last: Promise<unknown> = Promise.resolve()
  for (const event of events) {
    if (event.kind !== 'sample') continue
    const drawing = last.then(() => drawSample(event.sample.drawing))
    drawings.set(event.sample, drawing)
    last = drawing.catch(() => undefined)
  }
  return drawings
}

const mark = (action: string) => recordAudit(systemActor('demo'), { action })

/** Days before the demo day on which the clinic's own set-up is dated: before the first referral. */
const setUpDays = 470

/**
 * Makes the whole demo clinic: the clock is moved to each event of the timeline and put back at the end, so that every
 * date in the record is as if it had happened.
 */
export const seedClinic = async (appUrl: string): Promise<void> => {
  const demoNow = now()
  const demoToday = dayOf(demoNow, clinicSettings.timeZone)
  const moveTo = (moment: Date) => setClock(() => moment)
  moveTo(new Date(demoNow.getTime() - setUpDays * 86_400_000))
  try {
    await mark(demoBegun)
    const people = await seedPeople([...staff, ...teachers, ...parents])
    await changeSettings(actorOf(people, 'ines'), clinicSettings, 0)
    const events = demoTimeline(demoToday, clinicSettings.timeZone)
    const scene: Scene = {
      drawings: drawAhead(events),
      people,
      classes: await seedSchools(people, schoolYearOf(demoToday)),
      children: new Map(children.map((child) => [child.number, child])),
      stories: new Map(),
      timeZone: clinicSettings.timeZone,
      appUrl,
    }
    for (const event of events) {
      moveTo(event.at)
      await playEvent(scene, event, demoToday).catch((error: unknown) => {
        throw new Error(`The demo broke off at ${event.kind} of child ${event.child}`, { cause: error })
      })
    }
    await mark(demoMade)
  } finally {
    resetClock()
  }
}
