import fc from 'fast-check'
import jstat from 'jstat'
import { describe, expect, it } from 'vitest'
import { chanceCounts, chanceIndex, fairTail, signTest } from '../../shared/signTest.ts'

const { jStat } = jstat

describe('signTest', () => {
  it.each([
    // An open statistics course book (read): 8 heads of 10.
    ['8 of 10', 8, 2, 10, 0.109375, 0.0546875],
    // An online statistics text (read: one-sided .0352; the same page prints .0732 for twice that, a slip).
    ['7 of 8', 7, 1, 8, 0.0703125, 0.03515625],
    // Ties are dropped: (9 + 1) / 512.
    ['8 against 1 after a tie', 8, 1, 9, 0.0390625, 0.01953125],
    // 21 reaches: derived, computed in two programs.
    ['15 of 21 reaches', 15, 6, 21, 0.0783538818359375, 0.03917694091796875],
    ['16 of 21 reaches', 16, 5, 21, 0.02660369873046875, 0.013301849365234375],
  ])('gives %s exactly', (_name, plus, minus, n, twoSided, oneSided) => {
    expect(signTest({ plus, minus })).toEqual({ n, twoSided, oneSided })
    expect(signTest({ plus: minus, minus: plus })).toEqual({ n, twoSided, oneSided })
  })

  it('says nothing when only ties are left', () => {
    expect(signTest({ plus: 0, minus: 0 })).toEqual({ n: 0, twoSided: null, oneSided: null })
  })

  it('never goes above 1 when the signs are even', () => {
    expect(signTest({ plus: 3, minus: 3 }).twoSided).toBe(1)
  })

  it.each([
    [-1, 2],
    [1.5, 2],
    [900, 200],
  ])('refuses %d and %d', (plus, minus) => {
    expect(() => signTest({ plus, minus })).toThrow(RangeError)
  })

  it('agrees with the binomial distribution of a statistics library', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 200 }), fc.nat(200), (n, some) => {
        const least = some % (n + 1)
        let tail = 0
        for (let count = least; count <= n; count += 1) tail += jStat.binomial.pdf(count, n, 0.5)
        expect(fairTail(n, least)).toBeCloseTo(tail, 9)
      }),
    )
  })
})

describe('chance limits', () => {
  it.each([
    // 21: derived beside the vector above. Others by hand from binomial tables: 6 of 6 is 2/64 = .031, 5 of 5 is .0625.
    [21, 6, 15],
    [6, 1, 5],
    [5, 0, 5],
    [1, 0, 1],
  ])('of %d choices go from %d to %d', (n, low, high) => {
    expect(chanceCounts(n)).toEqual({ low, high })
  })

  it('are null when nothing was chosen', () => {
    expect(chanceCounts(0)).toBeNull()
    expect(chanceIndex(0)).toBeNull()
  })

  it('stand on the scale of the index: 15 of 21 is 42.9', () => {
    expect(chanceIndex(21)).toEqual({ low: expect.closeTo(-42.857, 3), high: expect.closeTo(42.857, 3) })
  })

  it('are the last counts within 5 %, one further is beyond', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 120 }), (n) => {
        const { low, high } = chanceCounts(n) ?? { low: NaN, high: NaN }
        expect(low + high).toBe(n)
        expect(signTest({ plus: high, minus: low }).twoSided).toBeGreaterThan(0.05)
        if (high < n) expect(signTest({ plus: high + 1, minus: low - 1 }).twoSided).toBeLessThanOrEqual(0.05)
      }),
    )
  })
})
