import type { SessionView } from '../../shared/users.ts'
import { roles, type Role } from '../../shared/roles.ts'
import { database } from '../dataSource.ts'
import { User } from '../entities/User.ts'
import { logger } from '../logger.ts'
import { staff, teachers } from './demo/people.ts'
import { parents } from './demo/parents.ts'
import { seedClinic } from './seedClinic.ts'

/** One sign-in for each role, shown on the sign-in page and by `npm start`. */
const shownFor: Record<Role, string> = {
  therapist: 'adaeze',
  clinicLead: 'ines',
  administrator: 'pauline',
  guardian: 'luciaQuispe',
  teacher: 'kwabena',
}

const demoSignIns = (): SessionView['demoSignIns'] => {
  const people = [...staff, ...teachers, ...parents]
  return roles.flatMap((role) => {
    const person = people.find(({ key }) => key === shownFor[role])
    return person ? [{ role, name: person.displayName, email: person.email, password: person.password }] : []
  })
}

/**
 * Fills an empty database with the demo clinic, once, through the same services as real use; answers the sign-ins to
 * show. A database that already holds accounts is left alone.
 */
export const seedDemoOnce = async (appUrl: string): Promise<SessionView['demoSignIns']> => {
  if ((await database().manager.count(User)) === 0) {
    const started = performance.now()
    await seedClinic(appUrl)
    logger.info({ ms: Math.round(performance.now() - started) }, 'the demo clinic was made')
  }
  return demoSignIns()
}
