import fc from 'fast-check'
import jstat from 'jstat'
import { describe, expect, it } from 'vitest'
import { incompleteBeta, logGamma } from '../../shared/incompleteBeta.ts'
import { normalCdf, normalUpperTail } from '../../shared/normalDistribution.ts'
import { studentTCdf, studentTFactor, studentTQuantile } from '../../shared/studentT.ts'

const { jStat } = jstat

describe('studentTQuantile', () => {
  it.each([
    // 12 degrees: the factor behind the regression interval of the check values, 2.178813. Others: printed t tables.
    [12, 2.178813],
    [1, 12.7062],
    [2, 4.30265],
    [10, 2.22814],
    [30, 2.04227],
  ])('gives the two-sided 95 %% factor for %d degrees of freedom', (df, factor) => {
    expect(studentTFactor(df)).toBeCloseTo(factor, 4)
  })

  it('is the tangent for one degree, where the distribution is Cauchy’s', () => {
    for (const p of [0.6, 0.9, 0.975, 0.999])
      expect(studentTQuantile(p, 1)).toBeCloseTo(Math.tan(Math.PI * (p - 0.5)), 8)
  })

  it('is odd about the middle', () => {
    expect(studentTQuantile(0.5, 7)).toBe(0)
    expect(studentTQuantile(0.025, 7)).toBe(-studentTQuantile(0.975, 7))
  })

  it.each([
    [0, 5],
    [1, 5],
    [NaN, 5],
    [0.9, 0],
    [0.9, -1],
  ])('refuses p %d with %d degrees', (p, df) => {
    expect(() => studentTQuantile(p, df)).toThrow(RangeError)
  })

  it('agrees with a statistics library, whole degrees or not', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 200, noNaN: true }),
        fc.double({ min: 0.001, max: 0.999, noNaN: true }),
        (df, p) => {
          const t = studentTQuantile(p, df)
          const theirs = jStat.studentt.inv(p, df)
          expect(Math.abs(t - theirs)).toBeLessThan(1e-5 * Math.max(1, Math.abs(theirs)))
          expect(studentTCdf(t, df)).toBeCloseTo(p, 10)
          expect(studentTCdf(t, df)).toBeCloseTo(jStat.studentt.cdf(t, df), 7)
        },
      ),
    )
  })
})

describe('the functions behind it', () => {
  it('give the gamma function at whole and half numbers: 4! and √π', () => {
    expect(Math.exp(logGamma(5))).toBeCloseTo(24, 10)
    expect(Math.exp(logGamma(0.5))).toBeCloseTo(Math.sqrt(Math.PI), 12)
  })

  it('agree with a statistics library on the incomplete beta function and the logarithm of gamma', () => {
    const shape = fc.double({ min: 0.1, max: 80, noNaN: true })
    fc.assert(
      fc.property(shape, shape, fc.double({ min: 0, max: 1, noNaN: true }), (a, b, x) => {
        expect(logGamma(a)).toBeCloseTo(jStat.gammaln(a), 8)
        expect(incompleteBeta(x, a, b)).toBeCloseTo(jStat.ibeta(x, a, b), 7)
        expect(incompleteBeta(x, a, b) + incompleteBeta(1 - x, b, a, x)).toBeCloseTo(1, 9)
      }),
    )
  })

  it('agree with a statistics library on the normal distribution', () => {
    fc.assert(
      fc.property(fc.double({ min: -8, max: 8, noNaN: true }), (z) => {
        expect(normalCdf(z)).toBeCloseTo(jStat.normal.cdf(z, 0, 1), 9)
        expect(normalCdf(z) + normalUpperTail(z)).toBeCloseTo(1, 12)
      }),
    )
  })

  it('keep the normal tail accurate far out and across the change of method at 3', () => {
    // Printed tables of the normal distribution: 1.3499e-3 beyond 3, 2.8665e-7 beyond 5, 6.2210e-16 beyond 8.
    expect(normalUpperTail(3) / 1.349898e-3).toBeCloseTo(1, 6)
    expect(normalUpperTail(5) / 2.866516e-7).toBeCloseTo(1, 6)
    expect(normalUpperTail(8) / 6.220961e-16).toBeCloseTo(1, 6)
    expect(normalUpperTail(2.9999999)).toBeCloseTo(normalUpperTail(3.0000001), 8)
  })

  it('give 1.96 its 2.5 %', () => {
    expect(normalUpperTail(1.959963984540054)).toBeCloseTo(0.025, 12)
  })
})
