import { describe, expect, it } from 'vitest'
import { pixelsPerMmOf } from '../../shared/scanDensity.ts'

// An inch is 25.4 mm exactly (international yard and pound agreement of 1959).
describe('pixelsPerMmOf', () => {
  it.each([
    ['an office scan', 300, 300 / 25.4],
    ['a fine scan', 600, 600 / 25.4],
    ['one dot a mm', 25.4, 1],
    ['what a phone writes by habit', 72, null],
    ['what a screen writes by habit', 96, null],
    ['nothing stated', null, null],
    ['zero', 0, null],
    ['no number', Number.NaN, null],
  ])('%s', (_what, density, expected) => {
    const found = pixelsPerMmOf(density)
    if (expected === null) expect(found).toBeNull()
    else expect(found).toBeCloseTo(expected, 9)
  })
})
