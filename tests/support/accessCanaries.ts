import type { Standing } from '../server/accessFixture.ts'
import { standingOf, type PersonKey } from './accessPeople.ts'
import type { Canaries, Scene } from './accessScene.ts'

/** Which parts of a record a standing may meet in any answer at all. Contacts are judged one by one. */
const mayMeet: Record<Standing, readonly (keyof Canaries)[]> = {
  T1: ['name', 'recordNumber', 'carers', 'clinical', 'goals', 'advice', 'letters', 'referral'],
  L: ['name', 'recordNumber', 'carers', 'clinical', 'goals', 'advice', 'letters', 'referral'],
  // Identity and contact, who agreed to what, and the referral as it came in.
  AD: ['name', 'recordNumber', 'carers', 'referral'],
  // Display name, class, writing hand, advice given and shared goals.
  E1: ['name', 'goals', 'advice'],
  // The own child's identity, what is shared, and letters sent to them.
  G1: ['name', 'recordNumber', 'carers', 'goals', 'advice'],
  T2: [],
  E0: [],
  EX: [],
  G0: [],
  GX: [],
}
const seesAllContacts: readonly Standing[] = ['T1', 'L', 'AD']

/** Every word that must not reach this person, whatever they ask for. */
export const forbiddenWords = (scene: Scene, person: PersonKey): string[] =>
  [...scene.children.values()].flatMap(({ key, canaries }) => {
    const standing = standingOf(person, key)
    const { contacts, ...parts } = canaries
    const words = (Object.keys(parts) as (keyof typeof parts)[])
      .filter((part) => !mayMeet[standing].includes(part))
      .flatMap((part) => parts[part])
    const others = Object.entries(contacts)
      .filter(([owner]) => !seesAllContacts.includes(standing) && owner !== person)
      .flatMap(([, values]) => values)
    return [...words, ...others]
  })

/** Every canary of the clinic: for those who are not signed in, and for every refusal. */
export const allWords = (scene: Scene): string[] =>
  [...scene.children.values()].flatMap(({ canaries: { contacts, ...parts } }) => [
    ...Object.values(parts).flat(),
    ...Object.values(contacts).flat(),
  ])
