import fc from 'fast-check'
import jstat from 'jstat'
import { combinations, linearRegression, median as libraryMedian } from 'simple-statistics'
import { describe, expect, it } from 'vitest'
import { addDays } from '../../shared/days.ts'
import { leastSquaresLine, leastSquaresSlope } from '../../shared/leastSquares.ts'
import { median, medianSlope, theilSenSlope } from '../../shared/theilSen.ts'

const { jStat } = jstat

/** The series of the Mann-Kendall example; slopes computed in two programs. */
const worked = [12.9, 14.8, 13.2, 15.7, 13.8, 15.6, 12.9, 11, 17.3, 15.9, 19, 18.3, 20.1, 21.7]
const points = worked.map((y, index) => ({ x: index + 1, y }))
const dated = (days: number[], values: number[]) =>
  days.map((day, index) => ({ on: addDays('2026-01-01', day), value: values[index] ?? NaN }))

const somePoints = fc.array(
  fc.record({ x: fc.integer({ min: 0, max: 60 }), y: fc.integer({ min: -500, max: 500 }) }),
  { minLength: 3, maxLength: 20 },
)

describe('theilSenSlope', () => {
  it('is the median of the 91 slopes of the worked series', () => {
    expect(medianSlope(points)).toBeCloseTo(0.566666666666667, 12)
    expect(
      theilSenSlope(
        dated(
          points.map(({ x }) => x),
          worked,
        ),
      ),
    ).toBeCloseTo(0.566666666666667, 12)
  })

  it('averages the middle two of an even number, as a web tutorial after Wilcox does (read)', () => {
    expect(median([-340, 130, 496, 561, 713, 800, 851, 952, 1184, 1327])).toBe(756.5)
    expect(median([])).toBeNull()
  })

  it('goes by real dates and not by the number of the session', () => {
    // By hand: slopes 2, −½ and ⅓; by row number it would be ½.
    expect(theilSenSlope(dated([1, 2, 4], [10, 12, 11]))).toBeCloseTo(1 / 3, 12)
  })

  it('skips pairs of one day and is null with fewer than three different days', () => {
    expect(
      medianSlope([
        { x: 3, y: 1 },
        { x: 3, y: 2 },
      ]),
    ).toBeNull()
    expect(theilSenSlope(dated([3, 3, 4], [1, 2, 5]))).toBeNull()
    expect(theilSenSlope(dated([3, 3, 4, 5], [1, 3, 4, 6]))).toBeCloseTo(2, 12)
  })

  it('does not care in which order the sessions come', () => {
    const series = dated([1, 9, 4, 20], [3, 8, 2, 11])
    expect(theilSenSlope(series.toReversed())).toBe(theilSenSlope(series))
  })

  it('agrees with the pairs and the median of a statistics library', () => {
    fc.assert(
      fc.property(somePoints, (some) => {
        const slopes = combinations(some, 2).flatMap(([one, other]) =>
          one && other && one.x !== other.x ? [(other.y - one.y) / (other.x - one.x)] : [],
        )
        const slope = medianSlope(some)
        if (slopes.length === 0) expect(slope).toBeNull()
        else expect(slope).toBeCloseTo(libraryMedian(slopes), 10)
      }),
    )
  })
})

describe('leastSquaresSlope', () => {
  it('gives slope, intercept, error and t interval of the worked series (computed in two programs)', () => {
    const line = leastSquaresLine(points)
    expect(line?.slope).toBeCloseTo(0.5613186813186813, 9)
    expect(line?.intercept).toBeCloseTo(11.66153846153846, 9)
    expect(line?.error).toBeCloseTo(0.13797087315936446, 9)
    expect(line?.interval?.low).toBeCloseTo(0.26070597275919394, 7)
    expect(line?.interval?.high).toBeCloseTo(0.8619313898781688, 7)
  })

  it('has no interval for two points and no slope for one day or fewer than three', () => {
    expect(
      leastSquaresLine([
        { x: 1, y: 2 },
        { x: 3, y: 6 },
      ]),
    ).toEqual({
      slope: 2,
      intercept: 0,
      error: null,
      interval: null,
    })
    expect(
      leastSquaresLine([
        { x: 2, y: 2 },
        { x: 2, y: 6 },
      ]),
    ).toBeNull()
    expect(leastSquaresLine([])).toBeNull()
    expect(leastSquaresSlope(dated([1, 2], [1, 2]))).toBeNull()
  })

  it('agrees with statistics libraries on slope, intercept and standard error', () => {
    fc.assert(
      fc.property(somePoints, (some) => {
        const line = leastSquaresLine(some)
        if (!line || line.error === null || line.error === 0) return
        const theirs = linearRegression(some.map(({ x, y }) => [x, y]))
        expect(line.slope).toBeCloseTo(theirs.m, 7)
        expect(line.intercept).toBeCloseTo(theirs.b, 6)
        const fitted = jStat.models.ols(
          some.map(({ y }) => y),
          some.map(({ x }) => [1, x]),
        )
        expect(line.error / (fitted.t.se[1] ?? NaN)).toBeCloseTo(1, 6)
        expect(line.interval?.high).toBeCloseTo(
          line.slope + jStat.studentt.inv(0.975, some.length - 2) * line.error,
          4,
        )
      }),
    )
  })
})
