import { parentOf } from '../../../server/seeds/demo/parents.ts'
import { staff, teachers, type StaffKey, type TeacherKey } from '../../../server/seeds/demo/people.ts'

export interface SignIn {
  email: string
  password: string
}

/** How a member of staff or a teacher of the demo signs in. */
export const signInOf = (key: StaffKey | TeacherKey): SignIn => {
  const person = [...staff, ...teachers].find((known) => known.key === key)
  if (!person) throw new Error(`Nobody in the demo is called ${key}`)
  return { email: person.email, password: person.password }
}

export const signInOfParent = (key: Parameters<typeof parentOf>[0]): SignIn => {
  const { email, password } = parentOf(key)
  return { email, password }
}
