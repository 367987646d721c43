import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { legibleLettersPerMinute, lettersPerMinute, percentLegible } from '../../shared/handwriting.ts'

// HW-01: 99 letters in 90 s are 66 a minute, conversion read on a teachers' worksheet of copying speeds.
// HW-02, 03, 05, 07: by definition. HW-04: percent legible as used in the general literature, from memory.
describe('lettersPerMinute', () => {
  it.each([
    ['HW-01', 99, 90, 66],
    ['HW-02 a true zero is zero', 0, 60, 0],
    ['HW-03 no time passed', 40, 0, null],
    ['letters not counted', null, 60, null],
    ['not timed', 40, null, null],
  ])('%s', (_id, letters, seconds, expected) => {
    expect(lettersPerMinute({ letters, seconds })).toBe(expected)
  })

  it('HW-07: counts readable letters apart', () => {
    expect(lettersPerMinute({ letters: 120, seconds: 120 })).toBe(60)
    expect(legibleLettersPerMinute({ legible: 120 - 18, seconds: 120 })).toBe(51)
  })

  it('stays the same when letters and time grow together', () => {
    const count = fc.integer({ min: 0, max: 500 })
    const time = fc.integer({ min: 30, max: 1800 })
    fc.assert(
      fc.property(count, time, fc.integer({ min: 2, max: 9 }), (letters, seconds, times) => {
        const once = lettersPerMinute({ letters, seconds })
        expect(lettersPerMinute({ letters: letters * times, seconds: seconds * times })).toBeCloseTo(once!, 9)
      }),
    )
  })
})

describe('percentLegible', () => {
  it.each([
    ['HW-04', 42, 50, 84],
    ['HW-05 nothing attempted', 0, 0, null],
    ['nothing readable', 0, 50, 0],
    ['not counted', null, 50, null],
    ['attempts not counted', 10, null, null],
  ])('%s', (_id, legible, attempted, expected) => {
    expect(percentLegible({ legible, attempted })).toBe(expected)
  })
})
