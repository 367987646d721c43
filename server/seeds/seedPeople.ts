import { randomUUID } from 'node:crypto'
import type { Tx } from '../dataSource.ts'
import { now } from '../clock.ts'
import { User } from '../entities/User.ts'
import { systemActor, type Actor } from '../access/actor.ts'
import { hashPassword } from '../services/passwords.ts'
import { transact } from '../services/transact.ts'
import type { ActorKey, DemoPerson } from './demo/demoTypes.ts'

export type People = Map<ActorKey, User>

const insertPerson = async (tx: Tx, person: DemoPerson, passwordHash: string): Promise<User> => {
  const user = tx.create(User, {
    id: randomUUID(),
    email: person.email,
    displayName: person.displayName,
    roles: person.roles,
    passwordHash,
    workingHand: person.workingHand,
    theme: 'system',
    newlyQualified: person.newlyQualified,
    wte: person.wte === null ? null : person.wte.toFixed(2),
    disabledAt: null,
    lastSignInAt: null,
    createdAt: now(),
  })
  await tx.insert(User, user)
  return user
}

/** Makes the accounts of these people, with their demo passwords. */
export const seedPeople = async (persons: readonly DemoPerson[]): Promise<People> => {
  const hashed = await inSmallGroups(persons, (person) => hashPassword(person.password))
  return transact(systemActor('demo'), async (tx, record) => {
    const people: People = new Map()
    for (const [index, person] of persons.entries())
      people.set(person.key, await insertPerson(tx, person, hashed[index] ?? ''))
    record({ action: 'demo.people', detail: { count: persons.length } })
    return people
  })
}

/** The hashing queue takes 52 at a time; the rest waits here. */
const inSmallGroups = async <T, R>(items: readonly T[], work: (item: T) => Promise<R>): Promise<R[]> => {
  const results: R[] = []
  for (let start = 0; start < items.length; start += 20)
    results.push(...(await Promise.all(items.slice(start, start + 20).map(work))))
  return results
}

/** Somebody who acts in the demo, as the services know them. */
export const actorOf = (people: People, key: ActorKey): Actor & { viewer: NonNullable<Actor['viewer']> } => {
  const user = people.get(key)
  if (!user) throw new Error(`The demo has no account for ${key}`)
  const { id, displayName, roles, newlyQualified } = user
  return { viewer: { id, displayName, roles, newlyQualified }, requestId: 'demo', audited: false }
}
