import fc from 'fast-check'
import jstat from 'jstat'
import { permutationsHeap } from 'simple-statistics'
import { describe, expect, it } from 'vitest'
import { mannKendall } from '../../shared/mannKendall.ts'

const { jStat } = jstat

/** A teaching note of an American college works this series by hand (read): S 54, Z about 2.9058, p about .0018. */
const worked = [12.9, 14.8, 13.2, 15.7, 13.8, 15.6, 12.9, 11, 17.3, 15.9, 19, 18.3, 20.1, 21.7]

describe('mannKendall', () => {
  it('gives the worked example with its one tie', () => {
    const found = mannKendall(worked)
    expect(found).toMatchObject({ n: 14, s: 54, increases: 72, decreases: 18, ties: 1, method: 'normal' })
    expect(found.variance).toBeCloseTo(332.6666666666667, 9)
    expect(found.z).toBeCloseTo(2.905836845996537, 9)
    expect(found.pOneSided).toBeCloseTo(0.001831361881441218, 9)
  })

  it('uses every order for ten values or fewer: five rising values are 1 of 120', () => {
    // Derived: the normal formula would give .0137.
    expect(mannKendall([1, 2, 3, 4, 5])).toMatchObject({ s: 10, method: 'exact' })
    expect(mannKendall([1, 2, 3, 4, 5]).pOneSided).toBeCloseTo(1 / 120, 12)
  })

  it('never reaches 5 % with three sessions', () => {
    expect(mannKendall([1, 2, 3])).toMatchObject({ s: 3, pOneSided: expect.closeTo(1 / 6, 12) })
  })

  it.each([[[5, 5, 5, 5]], [[7]], [[]]])('gives no test for %j', (series) => {
    expect(mannKendall(series)).toMatchObject({
      s: 0,
      z: null,
      pOneSided: null,
      pTwoSided: null,
      method: null,
    })
  })

  it('agrees with counting every order that a statistics library lists, with and without ties', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 4 }), { minLength: 2, maxLength: 6 }), (series) => {
        const found = mannKendall(series)
        if (found.pOneSided === null) return
        const scores = permutationsHeap(series).map((order) => mannKendall(order).s)
        const asFar = scores.filter((s) => s >= Math.abs(found.s)).length
        expect(found.pOneSided).toBeCloseTo(asFar / scores.length, 10)
      }),
      { numRuns: 60 },
    )
  })

  it('agrees with the normal distribution of a statistics library for more than ten values', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 9 }), { minLength: 11, maxLength: 40 }), (series) => {
        const { z, pOneSided } = mannKendall(series)
        if (z === null) return
        expect(pOneSided).toBeCloseTo(1 - jStat.normal.cdf(Math.abs(z), 0, 1), 8)
      }),
    )
  })

  it('turns round with the series and with its values', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 9 }), { minLength: 2, maxLength: 14 }), (series) => {
        const { s, pOneSided } = mannKendall(series)
        for (const turned of [series.toReversed(), series.map((value) => -value)]) {
          expect(mannKendall(turned).s).toBe(s === 0 ? 0 : -s)
          expect(mannKendall(turned).pOneSided).toBe(pOneSided)
        }
      }),
    )
  })
})
