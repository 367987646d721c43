import { addDays } from '../../shared/days.ts'
import type { CaseloadNeedKind } from '../../shared/caseload.ts'
import { now } from '../../server/clock.ts'
import type { User } from '../../server/entities/User.ts'
import { buildChild, buildClass, buildGuardian, giveConsent, type ChildRequest } from './factories.ts'
import { buildGoal, buildNote, buildQuestionnaire, buildSample } from './records.ts'
import { buildDelivery, buildLetter } from './storedLetters.ts'
import { buildTask } from './tasks.ts'

export const utcToday = () => now().toISOString().slice(0, 10)

interface BusyChild {
  id: string
  familyName: string
  recordNumber: string
  episodeId: string
  /** What waits for the therapist who holds the child. */
  waits: CaseloadNeedKind[]
}

type Build = (people: { therapist: User; lead: User }, given: ChildRequest) => Promise<BusyChild>

const consented = async (people: { therapist: User; lead: User }, given: ChildRequest) => {
  const child = await buildChild({ nextReviewOn: addDays(utcToday(), 60), ...given })
  await giveConsent(child, 'assessment_treatment', people.therapist)
  return child
}

/** One child of each kind: everything well, and one for each thing that can wait for the therapist. */
const kinds: Build[] = [
  async (people, given) => ({ ...(await consented(people, given)), waits: [] }),
  async (people, given) => ({
    ...(await consented(people, { ...given, nextReviewOn: addDays(utcToday(), -35) })),
    waits: ['review'],
  }),
  async (people, given) => {
    const child = await consented(people, given)
    await buildNote(child, people.therapist, 'draft')
    return { ...child, waits: ['unsigned_note'] }
  },
  async (people, given) => {
    const child = await consented(people, given)
    await buildNote(child, people.lead, 'awaiting_countersignature')
    return { ...child, waits: ['countersign'] }
  },
  async (people, given) => {
    const child = await consented(people, given)
    await buildLetter(child, people.therapist, 'draft')
    return { ...child, waits: ['letter_draft'] }
  },
  async (people, given) => {
    const child = await consented(people, given)
    const letter = await buildLetter(child, people.therapist, 'approved')
    await buildDelivery(letter, await buildGuardian(child), 'failed')
    return { ...child, waits: ['letter_failed'] }
  },
  async (_people, given) => ({
    ...(await buildChild({ nextReviewOn: addDays(utcToday(), 60), ...given })),
    waits: ['consent'],
  }),
  async (people, given) => {
    const child = await consented(people, given)
    await buildTask({ childId: child.id, assigneeId: people.therapist.id, dueOn: addDays(utcToday(), -1) })
    await buildTask({ childId: child.id, forRole: 'therapist', text: 'Write to the school' })
    return { ...child, waits: ['task'] }
  },
  async (people, given) => ({
    ...(await consented(people, {
      ...given,
      state: 'waiting',
      nextReviewOn: null,
      receivedOn: addDays(utcToday(), -137),
    })),
    waits: ['wait'],
  }),
  async (people, given) => {
    const child = await buildChild({ nextReviewOn: addDays(utcToday(), 3), ...given })
    await giveConsent(child, 'assessment_treatment', people.therapist, {
      expiresAt: new Date(now().getTime() + 10 * 86_400_000),
    })
    for (const day of [-30, -10, -4])
      await buildNote(child, people.therapist, 'signed', { heldOn: addDays(utcToday(), day) })
    await buildQuestionnaire(child, people.therapist, { locked: true })
    await buildGoal(child, people.therapist)
    await buildSample(child, people.therapist, Buffer.from('a picture'))
    await buildLetter(child, people.therapist, 'awaiting_approval')
    return { ...child, waits: ['review', 'consent'] }
  },
]

/** So many children of one therapist, of every kind in turn, some in a class. */
export const buildBusyCaseload = async (
  people: { therapist: User; lead: User },
  many: number,
): Promise<BusyChild[]> => {
  const schoolClass = await buildClass()
  const children: BusyChild[] = []
  for (let index = 0; index < many; index += 1) {
    const build = kinds[index % kinds.length]
    if (!build) throw new Error('There is no such kind of child')
    const number = String(index).padStart(2, '0')
    children.push(
      await build(people, {
        therapist: people.therapist,
        givenName: `Busy${number}`,
        familyName: `Caseload${number}`,
        schoolClassId: index % 2 === 0 ? schoolClass.id : null,
        birthDate: addDays('2015-01-01', index * 30),
      }),
    )
  }
  return children
}
