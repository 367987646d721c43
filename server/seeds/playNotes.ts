import type { Day } from '../../shared/days.ts'
import { database } from '../dataSource.ts'
import { SessionNote } from '../entities/SessionNote.ts'
import { countersignNote, signNote } from '../services/noteSigning.ts'
import { addAddendum, createNote } from '../services/sessionNotes.ts'
import type { DemoNote } from './demo/demoTypes.ts'
import type { StaffKey } from './demo/people.ts'
import { acting, idIn, storyOf, type Scene } from './playScene.ts'

const versionOf = async (id: string) =>
  (await database().manager.findOneByOrFail(SessionNote, { id })).version

export const playNote = async (
  scene: Scene,
  number: number,
  { note, index, on }: { note: DemoNote; index: number; on: Day },
): Promise<void> => {
  const story = storyOf(scene, number)
  const { actor, access } = await acting(scene, number, note.author)
  const {
    child: _child,
    heldDay: _day,
    author: _author,
    goals,
    signed: _signed,
    countersigned: _co,
    addenda: _addenda,
    ...text
  } = note
  const goalIds = goals.flatMap((goal) => story.goalIds.get(goal) ?? [])
  story.noteIds.set(index, await createNote(actor, access, { ...text, heldOn: on, goalIds }, null))
}

export const playSignature = async (
  scene: Scene,
  number: number,
  { index, by, lateReason }: { index: number; by: StaffKey; lateReason: string | null },
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  const id = idIn(storyOf(scene, number).noteIds, index)
  await signNote(actor, access, id, await versionOf(id), { confirmed: true, lateReason })
}

export const playCountersignature = async (
  scene: Scene,
  number: number,
  index: number,
  by: StaffKey,
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  const id = idIn(storyOf(scene, number).noteIds, index)
  await countersignNote(actor, access, id, await versionOf(id))
}

export const playAddendum = async (
  scene: Scene,
  number: number,
  { index, by, text }: { index: number; by: StaffKey; text: string },
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  await addAddendum(actor, access, idIn(storyOf(scene, number).noteIds, index), { text }, null)
}
