import { combineMeans } from 'simple-statistics'
import { describe, expect, it } from 'vitest'
import { summariseTrials } from '../../shared/handSkill.ts'
import { signTest } from '../../shared/signTest.ts'
import { wilsonInterval } from '../../shared/wilson.ts'

/*
 * 237 statistics students of the University of Adelaide: data set `survey` of the Debian package r-cran-mass 7.3-58.2-1
 * (GPL-2 or GPL-3; its notice believes the data files are not copyrighted), exported with R 4.2.2. Counts and means only.
 * Adults, and span is size and not skill: they check our arithmetic and are norms for nobody.
 */
const students = { all: 237, left: 18, right: 218, handUnknown: 1 }
const spans = {
  left: { n: 18, writing: 19.266666667, other: 19.055555556 },
  right: { n: 217, writing: 18.64562212, other: 18.569124424 },
  all: { n: 236, writing: 18.669068, other: 18.582627 },
}

describe('the open survey of 237 students', () => {
  it('adds up: two writing hands and one that was not told', () => {
    expect(students.left + students.right + students.handUnknown).toBe(students.all)
  })

  it('has group means that weigh up to the mean of all, with one student whose hand was not told', () => {
    for (const hand of ['writing', 'other'] as const) {
      const groups = combineMeans(spans.left[hand], spans.left.n, spans.right[hand], spans.right.n)
      // What is left of the total is that student's span. Spans were written down to a tenth of a centimetre, so this
      // comes out at a tenth, 13.0 for either hand, as far as six decimals of a mean of 236 can tell.
      const lastSpan = spans.all[hand] * spans.all.n - groups * (spans.left.n + spans.right.n)
      expect(lastSpan).toBeCloseTo(13, 3)
      const { trials, mean } = summariseTrials([
        ...Array<number>(spans.left.n).fill(spans.left[hand]),
        ...Array<number>(spans.right.n).fill(spans.right[hand]),
        13,
      ])
      expect(trials).toBe(spans.all.n)
      expect(mean).toBeCloseTo(spans.all[hand], 6)
    }
  })

  it('has 7.6 % left writers, with an interval that holds the 10.6 % of Papadatou-Pastou et al. 2020', () => {
    const interval = wilsonInterval(students.left, students.left + students.right)
    expect(interval?.low).toBeCloseTo(0.04878699256843312, 8)
    expect(interval?.high).toBeCloseTo(0.11732882000457025, 8)
    expect(interval !== null && interval.low < 0.106 && interval.high > 0.106).toBe(true)
  })

  it('finds no side in the spans: wider on the writing side for 11 of 16 left writers, 91 against 88 right ones', () => {
    expect(11 + 2 + 5).toBe(students.left)
    expect(91 + 38 + 88).toBe(spans.right.n)
    // Sums of binomial coefficients in whole numbers, done apart: .210114 and .881223.
    expect(signTest({ plus: 11, minus: 5 }).twoSided).toBeCloseTo(0.210114, 6)
    expect(signTest({ plus: 91, minus: 88 }).twoSided).toBeCloseTo(0.881223, 6)
  })
})
