import type { SessionView } from '../../shared/users.ts'
import { roles, type Role } from '../../shared/roles.ts'
import { staff, teachers } from './demo/people.ts'
import { parents } from './demo/parents.ts'

/** One sign-in for each role, shown on the sign-in page and by `npm start`. */
const shownFor: Record<Role, string> = {
  therapist: 'adaeze',
  clinicLead: 'ines',
  administrator: 'pauline',
  guardian: 'luciaQuispe',
  teacher: 'kwabena',
}

/** The people of the demo whom a visitor may be. */
export const demoSignIns = (): SessionView['demoSignIns'] => {
  const people = [...staff, ...teachers, ...parents]
  return roles.flatMap((role) => {
    const person = people.find(({ key }) => key === shownFor[role])
    return person ? [{ role, name: person.displayName, email: person.email, password: person.password }] : []
  })
}
