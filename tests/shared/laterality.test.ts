import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  formatQuotient,
  lateralityQuotient,
  oneMarkScore,
  quotientDirection,
  quotientStrength,
  twoMarkScore,
  type HandMark,
} from '../../shared/laterality.ts'

const markOf: Record<string, HandMark> = {
  'L++': 'left_twice',
  'L+': 'left_once',
  B: 'both',
  'R+': 'right_once',
  'R++': 'right_twice',
  '-': null,
}
const marks = (codes: string) => codes.split(' ').map((code) => markOf[code]!)
const times = (code: string, n: number) => Array<string>(n).fill(code).join(' ')

// Oldfield 1971, Neuropsychologia 9:97-113: formula and two-mark convention as restated on a public
// common-data-elements page for the inventory; sums and quotients worked by hand from it.
describe('twoMarkScore', () => {
  it.each([
    ['LQ-01 ceiling', times('R++', 10), 20, 0, 10, 100],
    ['LQ-02 floor', times('L++', 10), 0, 20, 10, -100],
    ['LQ-03 both everywhere is zero, not undefined', times('B', 10), 10, 10, 10, 0],
    ['LQ-06 one answer', `L++ ${times('-', 9)}`, 0, 2, 1, -100],
    ['LQ-08 single marks reach the ceiling too', times('R+', 10), 10, 0, 10, 100],
    ['LQ-09 balanced', `${times('R++', 5)} ${times('L++', 5)}`, 10, 10, 10, 0],
    ['LQ-10 double marks outweigh single', `${times('R+', 5)} ${times('L++', 5)}`, 5, 10, 10, -100 / 3],
    ['LQ-11 both is not blank', `L++ ${times('B', 9)}`, 9, 11, 10, -10],
    ['LQ-12 blanks leave both sums', 'L++ L++ L+ L+ L+ - - - - R+', 1, 7, 6, -75],
  ])('%s', (_id, codes, right, left, answered, quotient) => {
    const score = twoMarkScore(marks(codes))
    expect(score).toMatchObject({ right, left, answered })
    expect(score.quotient).toBeCloseTo(quotient, 6)
  })

  it('LQ-13: the one-mark variant ignores how strong each mark is', () => {
    const weak = marks('L+ L+ L+ R+ L+ L+ L+ B B B')
    const strong = marks('L++ L+ L++ R++ L+ L++ L+ B B B')
    expect(oneMarkScore(weak)).toMatchObject({ right: 4, left: 9 })
    expect(oneMarkScore(weak).quotient).toBeCloseTo(-38.46153846, 6)
    expect(oneMarkScore(strong)).toEqual(oneMarkScore(weak))
  })

  it('answers null when every activity is blank', () => {
    expect(twoMarkScore(marks(times('-', 10)))).toEqual({ left: 0, right: 0, answered: 0, quotient: null })
    expect(twoMarkScore([]).quotient).toBeNull()
  })
})

describe('lateralityQuotient', () => {
  const counts = fc.record({ left: fc.nat(40), right: fc.nat(40) })

  it('changes sign and nothing else when the hands are swapped', () => {
    fc.assert(
      fc.property(counts, ({ left, right }) => {
        const quotient = lateralityQuotient({ left, right })
        const mirrored = lateralityQuotient({ left: right, right: left })
        if (quotient === null) expect(mirrored).toBeNull()
        else expect(mirrored! + quotient).toBe(0)
      }),
    )
  })

  it('stays within -100 and +100 and is null only without marks', () => {
    fc.assert(
      fc.property(counts, ({ left, right }) => {
        const quotient = lateralityQuotient({ left, right })
        expect(quotient === null).toBe(left + right === 0)
        if (quotient !== null) expect(Math.abs(quotient)).toBeLessThanOrEqual(100)
      }),
    )
  })
})

// Degree and direction kept apart: read in a university handedness-scoring note.
describe('degree and direction', () => {
  it('LQ-14: -57.1 is 57.1 to the left', () => {
    expect(quotientStrength(-57.142857142857146)).toBeCloseTo(57.142857142857146, 6)
    expect(quotientDirection(-57.142857142857146)).toBe('left')
  })

  it('LQ-15: zero has no direction', () => {
    expect(quotientStrength(0)).toBe(0)
    expect(quotientDirection(0)).toBe('none')
    expect(quotientDirection(0.5)).toBe('right')
  })
})

describe('formatQuotient', () => {
  it.each([
    [-88.23529, '−88.2'],
    [6.66667, '+6.7'],
    [0, '0.0'],
    [-0.04, '0.0'],
    [100, '+100.0'],
    [-100, '−100.0'],
    [null, 'not scorable'],
  ])('shows %j as %s', (quotient, expected) => {
    expect(formatQuotient(quotient)).toBe(expected)
  })
})
