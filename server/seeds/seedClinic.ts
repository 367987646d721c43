import { changeSettings } from '../services/settings.ts'
import { createClass, createSchool } from '../services/schools.ts'
import { dayOf } from '../../shared/days.ts'
import { now, setClock } from '../clock.ts'
import { clinicSettings } from './demo/clinic.ts'
import { parents } from './demo/parents.ts'
import { staff, teachers } from './demo/people.ts'
import { schools, schoolYearOf, type ClassKey } from './demo/schools.ts'
import { actorOf, seedPeople, type People } from './seedPeople.ts'

const seedSchools = async (people: People): Promise<Map<ClassKey, string>> => {
  const pauline = actorOf(people, 'pauline')
  const classes = new Map<ClassKey, string>()
  const schoolYear = schoolYearOf(dayOf(now(), clinicSettings.timeZone))
  for (const school of schools) {
    const schoolId = await createSchool(pauline, { name: school.name, town: school.town }, null)
    const teacherId = actorOf(people, school.teacher).viewer.id
    for (const { key, name, ages } of school.classes)
      classes.set(key, await createClass(pauline, { schoolId, name, schoolYear, ages, teacherId }, null))
  }
  return classes
}

/** Days before the demo day on which the clinic's own set-up is dated. */
const setUpDays = 460

/** Makes the whole demo clinic. The clock is moved to each event and put back at the end. */
export const seedClinic = async (): Promise<void> => {
  const demoNow = now()
  setClock(() => new Date(demoNow.getTime() - setUpDays * 86_400_000))
  try {
    const people = await seedPeople([...staff, ...teachers, ...parents])
    await changeSettings(actorOf(people, 'ines'), clinicSettings, 0)
    await seedSchools(people)
  } finally {
    setClock(() => new Date())
  }
}
