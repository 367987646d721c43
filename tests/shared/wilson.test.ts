import fc from 'fast-check'
import jstat from 'jstat'
import { describe, expect, it } from 'vitest'
import { wilsonInterval, z95 } from '../../shared/wilson.ts'

const { jStat } = jstat

describe('wilsonInterval', () => {
  // Newcombe 1998, Stat Med 17:857-872, rows of the score method (printed limits from memory, R gives the same).
  it.each([
    [81, 263, 0.2553, 0.3662],
    [15, 148, 0.0624, 0.1605],
    [0, 20, 0, 0.1611],
    [1, 29, 0.0061, 0.1718],
  ])('gives the published limits of %d in %d', (k, n, low, high) => {
    const interval = wilsonInterval(k, n)
    expect(interval?.low).toBeCloseTo(low, 4)
    expect(interval?.high).toBeCloseTo(high, 4)
  })

  it('gives 23 of 60 as worked on a university statistics page (inputs read, limits computed twice)', () => {
    const interval = wilsonInterval(23, 60)
    expect(interval?.low).toBeCloseTo(0.27088272374082023, 9)
    expect(interval?.high).toBeCloseTo(0.5098240417590008, 9)
  })

  it('ends at exactly 1 when all of 20 agree, the mirror of 0 of 20', () => {
    expect(wilsonInterval(20, 20)).toEqual({ low: expect.closeTo(0.8388748419471806, 9), high: 1 })
  })

  it('is null for nothing of nothing and refuses more than all', () => {
    expect(wilsonInterval(0, 0)).toBeNull()
    expect(() => wilsonInterval(5, 4)).toThrow(RangeError)
  })

  it('has limits that the chi-squared test of a statistics library puts just at 5 %', () => {
    // The score interval holds every share that the one-degree chi-squared test does not reject.
    const critical = jStat.chisquare.inv(0.95, 1)
    expect(z95 ** 2).toBeCloseTo(critical, 8)
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 400 }), fc.double({ min: 0, max: 1, noNaN: true }), (n, part) => {
        const k = Math.round(part * n)
        const { low, high } = wilsonInterval(k, n) ?? { low: NaN, high: NaN }
        for (const limit of [low, high].filter((share) => share > 0 && share < 1)) {
          const expected = [n * limit, n * (1 - limit)] as const
          const chi = (k - expected[0]) ** 2 / expected[0] + (n - k - expected[1]) ** 2 / expected[1]
          expect(chi).toBeCloseTo(critical, 6)
        }
        const mirror = wilsonInterval(n - k, n)
        expect(mirror?.low).toBeCloseTo(1 - high, 10)
        expect(mirror?.high).toBeCloseTo(1 - low, 10)
      }),
    )
  })
})
