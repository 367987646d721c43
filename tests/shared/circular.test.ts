import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { axialMean, circularMean } from '../../shared/circular.ts'

/** 51 directions of Davis 1986 as on a statistics package's reference page (read: mean resultant length .8003694). */
const davis = [
  ...[23, 27, 53, 58, 64, 83, 85, 88, 93, 99, 100, 105, 113, 113, 114, 117, 121, 123, 125, 126, 126, 126],
  ...[127, 127, 128, 128, 129, 132, 132, 132, 134, 135, 137, 144, 145, 145, 146, 153, 155, 155, 155, 157],
  ...[163, 165, 171, 172, 179, 181, 186, 190, 212],
]

describe('circularMean', () => {
  it.each([
    ['51 directions (length read, direction computed in two programs)', davis, 129.19027458595, 0.8003693873],
    // Mardia & Jupp 2000: 51 degrees, .711 (from memory), recomputed.
    ['the roulette example', [43, 45, 52, 61, 75, 88, 88, 279, 357], 51.050177, 0.7109909988],
    // Zar, Biostatistical Analysis: leaning trees, 99 degrees, .825 (from memory), recomputed.
    ['the leaning trees', [45, 55, 81, 96, 110, 117, 132, 154], 98.98775195, 0.82521774482],
  ])('gives %s', (_name, angles, degrees, resultant) => {
    expect(circularMean(angles)?.degrees).toBeCloseTo(degrees, 5)
    expect(circularMean(angles)?.resultant).toBeCloseTo(resultant, 8)
  })

  it('puts 1 and 359 at 0, not at 180 and not at 360', () => {
    expect(circularMean([1, 359])).toEqual({ degrees: 0, resultant: expect.closeTo(0.9998476951563913, 12) })
  })

  it('has no direction when angles cancel, and none for nothing', () => {
    expect(circularMean([0, 180])?.degrees).toBeNull()
    expect(circularMean([10, 130, 250])?.degrees).toBeNull()
    expect(circularMean([])).toBeNull()
  })

  it('turns with the angles', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 0, max: 359 }), { minLength: 1, maxLength: 20 }),
        fc.integer({ min: -720, max: 720 }),
        (angles, turn) => {
          const before = circularMean(angles)
          const after = circularMean(angles.map((angle) => angle + turn))
          expect(after?.resultant).toBeCloseTo(before?.resultant ?? NaN, 9)
          if (!before || before.degrees === null || before.resultant < 1e-6) return
          const gap = Math.abs((after?.degrees ?? NaN) - before.degrees - turn) % 360
          expect(Math.min(gap, 360 - gap)).toBeLessThan(1e-5)
        },
      ),
    )
  })
})

describe('axialMean', () => {
  it('puts lines at 10 and 170 degrees at 0: doubled, averaged, halved', () => {
    expect(axialMean([10, 170])).toEqual({ degrees: 0, resultant: expect.closeTo(0.9396926207859084, 12) })
  })

  it('sees a line and the same line turned round as one', () => {
    expect(axialMean([30, 210])?.degrees).toBeCloseTo(30, 9)
    expect(axialMean([])).toBeNull()
  })
})
