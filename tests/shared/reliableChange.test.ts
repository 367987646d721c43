import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  minimalDetectableChange,
  reliabilitiesRead,
  reliableChange,
  reliableChangeFromSem,
  standardErrorOfMeasurement,
} from '../../shared/reliableChange.ts'

describe('reliableChange', () => {
  it('gives the worked example of Jacobson & Truax 1991: 3.35, 4.74 and 3.16 (from memory)', () => {
    const change = reliableChange({ sd: 7.5, r: 0.8 }, 32.5, 47.5)
    expect(change.sem).toBeCloseTo(3.354101966249684, 9)
    expect(change.seDifference).toBeCloseTo(4.743416490252568, 9)
    expect(change.index).toBeCloseTo(3.16227766016838, 9)
    expect(change.mdc95).toBeCloseTo(9.297096320895033, 3)
    expect(change.reliable).toBe(true)
  })

  it('calls 11 points reliable for a standard error of 3.07, as an open university textbook does (read: 4.34, 8.51)', () => {
    const change = reliableChangeFromSem(3.07, 24, 35)
    expect(change.seDifference).toBeCloseTo(4.34, 2)
    expect(change.mdc95).toBeCloseTo(8.51, 2)
    expect(change.index).toBeCloseTo(2.5336073593003334, 9)
    expect(change.reliable).toBe(true)
  })

  it('asks 5.54 of a measure with a standard error of 2 (formula of a published trial protocol)', () => {
    expect(minimalDetectableChange(2)).toBeCloseTo(5.5437171645025325, 9)
  })

  it('does not call 40 points reliable where measures scatter by 60', () => {
    const change = reliableChange({ sd: 60, r: 0.9 }, -40, -80)
    expect(change.sem).toBeCloseTo(18.973665961010273, 9)
    expect(change.index).toBeCloseTo(-1.49071198499986, 9)
    expect(change.mdc95).toBeCloseTo(52.59231883079505, 9)
    expect(change.reliable).toBe(false)
  })

  it.each([
    [5, 1],
    [0, 0.8],
  ])('has no index when nothing scatters: SD %d, r %d', (sd, r) => {
    expect(reliableChange({ sd, r }, 10, 10)).toEqual({
      sem: 0,
      seDifference: 0,
      index: null,
      mdc95: 0,
      reliable: null,
    })
  })

  it.each([
    [-1, 0.8],
    [5, 1.2],
    [5, -0.1],
    [NaN, 0.5],
  ])('refuses SD %d and r %d', (sd, r) => {
    expect(() => standardErrorOfMeasurement({ sd, r })).toThrow(RangeError)
  })

  it('is reliable exactly when the change reaches the smallest detectable one', () => {
    const positive = fc.double({ min: 0.1, max: 50, noNaN: true })
    fc.assert(
      fc.property(positive, fc.double({ min: 0, max: 0.99, noNaN: true }), positive, (sd, r, after) => {
        const { mdc95, reliable, index } = reliableChange({ sd, r }, 0, after)
        if (Math.abs(after - mdc95) > 1e-9) expect(reliable).toBe(after > mdc95)
        expect(reliableChange({ sd, r }, after, 0).index).toBe(index === null ? null : -index)
      }),
    )
  })

  it('names a source for every coefficient that was read', () => {
    expect(reliabilitiesRead.every(({ source }) => /\d{4}/.test(source))).toBe(true)
    expect(reliabilitiesRead[0]).toMatchObject({
      coefficient: 'retest .81 and .79',
      source: expect.stringContaining('Smith et al. 2000'),
    })
  })
})
