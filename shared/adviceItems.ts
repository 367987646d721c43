import type { AdviceItem } from './adviceItem.ts'
import { homeItems } from './adviceItems/home.ts'
import { seatingItems } from './adviceItems/seating.ts'
import { toolItems } from './adviceItems/tools.ts'
import { writingLessonItems } from './adviceItems/writingLessons.ts'
import { writingPostureItems } from './adviceItems/writingPosture.ts'

/** The advice library, by family: writing, tools, seating, then home, computers and tests. */
export const adviceItems: readonly AdviceItem[] = [
  ...writingPostureItems,
  ...writingLessonItems,
  ...toolItems,
  ...seatingItems,
  ...homeItems,
]

/** The item of that id, or null when the library has none. */
export const adviceItemById = (id: string): AdviceItem | null =>
  adviceItems.find((item) => item.id === id) ?? null
