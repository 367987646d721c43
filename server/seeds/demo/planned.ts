import type { Offset, TimeOfDay } from './demoTypes.ts'
import type { DemoHappening } from './timelineTypes.ts'

/** Something that is to happen on a day and time of the story, before dates are put to it. */
export interface Planned {
  day: Offset
  time: TimeOfDay
  happening: DemoHappening
}

export const at = (day: Offset, time: TimeOfDay, happening: DemoHappening): Planned => ({
  day,
  time,
  happening,
})

/** What of a table is about one child. */
export const of = <T extends { child: number }>(items: readonly T[], child: number): T[] =>
  items.filter((item) => item.child === child)
