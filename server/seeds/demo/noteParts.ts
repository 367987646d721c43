import type { DemoNote, Offset, TimeOfDay } from './demoTypes.ts'
import type { StaffKey } from './people.ts'

interface Parts {
  child: number
  day: Offset
  start: TimeOfDay
  /** What the child or family said. */
  s: string
  /** What was seen or measured. */
  o: string
  /** What it means. */
  a: string
  /** What happens next. */
  p: string
  minutes?: number
  type?: DemoNote['type']
  present?: string
  assent?: DemoNote['assent']
  goals?: number[]
  /** Day of signing; the day of the session unless said otherwise, null for a draft. */
  signed?: Offset | null
  lateReason?: string
  countersigned?: DemoNote['countersigned']
  addenda?: DemoNote['addenda']
}

/** A note in the order of the trade. Signed on the day, unless said otherwise. */
const note = (author: StaffKey, parts: Parts): DemoNote => ({
  child: parts.child,
  heldDay: parts.day,
  author,
  startTime: parts.start,
  minutes: parts.minutes ?? 45,
  type: parts.type ?? 'session',
  present: parts.present ?? null,
  assent: parts.assent ?? 'willing',
  said: parts.s,
  observed: parts.o,
  meaning: parts.a,
  plan: parts.p,
  goals: parts.goals ?? [],
  signed:
    parts.signed === null ? null : { day: parts.signed ?? parts.day, lateReason: parts.lateReason ?? null },
  countersigned: parts.countersigned ?? null,
  addenda: parts.addenda ?? [],
})

export const notesBy =
  (author: StaffKey) =>
  (parts: Parts): DemoNote =>
    note(author, parts)

/** For an author whose notes need a second signature: the lead signs two days later. */
export const countersignedNotesBy =
  (author: StaffKey) =>
  (parts: Parts): DemoNote =>
    note(author, { countersigned: { day: parts.day + 2, by: 'ines' }, ...parts })
