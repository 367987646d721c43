import type { DemoGoal, Offset } from './demoTypes.ts'
import type { StaffKey } from './people.ts'

interface Parts {
  child: number
  by: StaffKey
  set: Offset
  target: Offset
  activity: string
  voice: string
  /** From −2 to +2. */
  levels: [string, string, string, string, string]
  baseline: -2 | -1
  /** Importance and difficulty, 0 to 3. */
  weigh: [importance: number, difficulty: number]
  rated?: [level: number, day: Offset, note?: string][]
  ended?: DemoGoal['ended']
}

export const goal = ({
  child,
  by,
  set,
  target,
  activity,
  voice,
  levels,
  baseline,
  weigh,
  rated,
  ended,
}: Parts): DemoGoal => ({
  child,
  by,
  setDay: set,
  details: {
    activity,
    childVoice: voice,
    levels,
    baseline,
    importance: weigh[0],
    difficulty: weigh[1],
    targetDay: target,
  },
  ratings: (rated ?? []).map(([level, day, note]) => ({ level, day, note: note ?? null })),
  ended: ended ?? null,
})
