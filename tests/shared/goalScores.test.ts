import { describe, expect, it } from 'vitest'
import { goalScores } from '../../shared/goalScores.ts'
import type { GoalOutcome } from '../../shared/goals.ts'

const goal = (
  [importance, difficulty]: [number, number],
  baseline: number,
  latestLevel: number | null,
  outcome: GoalOutcome | null = null,
) => ({ details: { baseline, importance, difficulty }, latestLevel, outcome })

// Weights 6, 4 and 2 from (-1, -1, -2) to (0, +1, 0): 34.6 and 54.4, the clinic's check values for the erratum form
// (Turner-Stokes 2009, Clin Rehabil 23:362-370, with its published erratum).
const three = [goal([3, 2], -1, 0), goal([2, 2], -1, 1), goal([2, 1], -2, 0, 'finished')]

describe('goalScores', () => {
  it('gives T at the start and now over open and finished goals', () => {
    const { baselineT, followUpT, scored } = goalScores(three)
    expect(baselineT).toBeCloseTo(34.6, 1)
    expect(followUpT).toBeCloseTo(54.4, 1)
    expect(scored).toBe(3)
  })

  it('leaves out a goal that was set aside, and one that was never rated', () => {
    const more = [...three, goal([3, 3], -2, 2, 'set_aside'), goal([3, 3], -2, null)]
    expect(goalScores(more)).toMatchObject({ scored: 3, of: 4 })
    expect(goalScores(more).followUpT).toBeCloseTo(54.4, 1)
  })

  it('has no figure when nothing was rated', () => {
    expect(goalScores([goal([1, 1], -2, null)])).toMatchObject({
      baselineT: null,
      followUpT: null,
      scored: 0,
    })
    expect(goalScores([])).toMatchObject({ baselineT: null, followUpT: null })
  })
})
