import { createTransport } from 'nodemailer'
import type { Actor, Viewer } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { findChildAccess } from '../queries/childAccess.ts'
import type { ActorKey, DemoChild, DemoSample } from './demo/demoTypes.ts'
import type { ClassKey } from './demo/schools.ts'
import { actorOf, type People } from './seedPeople.ts'

/** Ids of what a child's story has made so far; `index` counts within the child as in the timeline. */
export interface Story {
  childId: string
  referralId: string
  guardianIds: string[]
  consentIds: Map<number, string>
  sampleIds: Map<number, string>
  goalIds: Map<number, string>
  noteIds: Map<number, string>
  letterIds: Map<number, string>
  taskIds: Map<number, string>
  conclusionIds: Map<number, string>
  /** By the key of what was asked. */
  requestIds: Map<string, string>
}

export interface Scene {
  people: People
  classes: Map<ClassKey, string>
  children: Map<number, DemoChild>
  stories: Map<number, Story>
  /** Drawn ahead, one after the other, while the story is played. */
  drawings: Map<DemoSample, Promise<Buffer>>
  timeZone: string
  /** Address that the letters' links lead to. */
  appUrl: string
}

export const newStory = (referralId: string): Story => ({
  childId: '',
  referralId,
  guardianIds: [],
  consentIds: new Map(),
  sampleIds: new Map(),
  goalIds: new Map(),
  noteIds: new Map(),
  letterIds: new Map(),
  taskIds: new Map(),
  conclusionIds: new Map(),
  requestIds: new Map(),
})

export const childOf = (scene: Scene, number: number): DemoChild => {
  const child = scene.children.get(number)
  if (!child) throw new Error(`The demo has no child ${number}`)
  return child
}

export const storyOf = (scene: Scene, number: number): Story => {
  const story = scene.stories.get(number)
  if (!story) throw new Error(`Child ${number} of the demo has not been referred yet`)
  return story
}

export const idIn = <Key extends string | number>(ids: Map<Key, string>, index: Key): string => {
  const id = ids.get(index)
  if (id === undefined) throw new Error(`The demo refers to something that has not happened yet (${index})`)
  return id
}

/** Hands the e-mails over without a network: the same worker as in real use, with a receiver that answers at once. */
export const accepting = createTransport({ streamTransport: true, buffer: true })

export interface Acting {
  actor: Actor
  viewer: Viewer
  access: ChildAccess
}

/** Somebody before a child's record, with the access the product itself finds for them. */
export const acting = async (scene: Scene, number: number, key: ActorKey): Promise<Acting> => {
  const actor = actorOf(scene.people, key)
  const access = await findChildAccess(actor.viewer, storyOf(scene, number).childId)
  if (!access) throw new Error(`${key} has no access to child ${number} of the demo`)
  return { actor, viewer: actor.viewer, access }
}
