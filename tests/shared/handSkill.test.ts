import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  countedTrials,
  nextTrial,
  scoreSkill,
  skillCautions,
  skillIndex,
  summariseTrials,
  unansweredTrials,
  unlikelyTrial,
} from '../../shared/handSkill.ts'
import type { SkillDetails, SkillTrial } from '../../shared/measures.ts'
import { hands, type Hand } from '../../shared/roles.ts'

const trial = (hand: Hand, value: number | null, more: Partial<SkillTrial> = {}): SkillTrial => ({
  ...{ hand, value, interrupted: false, confirmed: false },
  ...more,
})
const trials = (left: number[], right: number[]) => [
  ...left.map((value) => trial('left', value)),
  ...right.map((value) => trial('right', value)),
]
const details = (given: Partial<SkillDetails>): SkillDetails => ({
  ...{ kind: 'pegs', startHand: 'left', pegs: 10, seconds: null, trials: [] },
  ...given,
})

// Difference as a share of the total: Schmidt et al. 2000, Neuropsychologia 38:529-534 (abstract read); values by hand.
describe('skillIndex', () => {
  it.each([
    ['PERF-01 more taps with the left', 'count', 45, 50, -5.2631578947368425],
    ['more taps with the right, the mirror of PERF-01', 'count', 50, 45, 5.2631578947368425],
    ['PERF-03 left quicker: minus, as for counts', 'seconds', 24.5, 22, -5.376344086021505],
    ['PERF-04 right quicker', 'seconds', 22, 24.5, 5.376344086021505],
    ['PERF-05 nothing counted with either', 'count', 0, 0, null],
    ['PERF-06 one hand only', 'seconds', 20, null, null],
    ['the other hand only', 'count', null, 20, null],
    // Omar, Alghadir, Zafar & Al Baker (abstract): dominant and other hand, here the right hand as the dominant one.
    ['PERF-08 boys, group means', 'seconds', 20.68, 23.46, 6.298142274580882],
    ['PERF-09 girls, group means', 'seconds', 19.7, 21.79, 5.037358399614366],
    // Nine-hole pegs of healthy men as a web page quotes Mathiowetz et al. 1985.
    ['PERF-10 men', 'seconds', 19, 20.6, 4.040404040404041],
    ['one hand does nothing at all', 'count', 12, 0, 100],
  ] as const)('%s', (_id, unit, right, left, expected) => {
    const index = skillIndex(unit, { left, right })
    if (expected === null) expect(index).toBeNull()
    else expect(index).toBeCloseTo(expected, 6)
  })
})

describe('scoreSkill', () => {
  /*
   * Means, deviations, t intervals and the interval of the index computed apart in Python with SciPy 1.17 (stats.t, numerical
   * derivatives instead of the formula).
   */
  it.each([
    [
      'pegs',
      [22.1, 21.8, 22.4],
      [24.9, 24.2, 24.6],
      [22.1, 0.3, 21.35475868647491, 22.8452413135251],
      [24.566666666666663, 0.3511884584284244, 23.69426617315315, 25.439067160180176],
      [-5.285714285714266, -6.862991027745726, -3.7084375436828063],
    ],
    [
      'tapping',
      [45, 47, 44, 46],
      [51, 50, 54],
      [45.5, 1.2909944487358056, 43.44573974323948, 47.55426025676052],
      [51.666666666666664, 2.0816659994661326, 46.4955216541244, 56.837811679208926],
      [6.346483704974269, 2.3283461140917545, 10.364621295856784],
    ],
  ] as const)('%s: means, spread, intervals and index', (kind, left, right, ofLeft, ofRight, ofIndex) => {
    const score = scoreSkill({ kind, trials: trials([...left], [...right]) })
    for (const [hand, [mean, sd, low, high]] of [
      [score.left, ofLeft],
      [score.right, ofRight],
    ] as const) {
      expect(hand.mean).toBeCloseTo(mean, 9)
      expect(hand.sd).toBeCloseTo(sd, 9)
      expect(hand.interval?.low).toBeCloseTo(low, 6)
      expect(hand.interval?.high).toBeCloseTo(high, 6)
    }
    expect(score.index).toBeCloseTo(ofIndex[0], 9)
    expect(score.interval?.low).toBeCloseTo(ofIndex[1], 5)
    expect(score.interval?.high).toBeCloseTo(ofIndex[2], 5)
  })

  // Sample standard deviation and t(.975; 4) = 2.776445 from printed tables: 2, 4, 4, 4, 6 has mean 4 and sd √2.
  it('uses n − 1 and Student’s t', () => {
    const { mean, sd, interval } = summariseTrials([2, 4, 4, 4, 6])
    expect([mean, sd]).toEqual([4, expect.closeTo(Math.SQRT2, 12)])
    expect(interval?.high).toBeCloseTo(4 + (2.776445 * Math.SQRT2) / Math.sqrt(5), 5)
  })

  it('answers null where there are too few trials, never 0', () => {
    expect(summariseTrials([])).toEqual({ trials: 0, mean: null, sd: null, interval: null })
    expect(summariseTrials([12])).toEqual({ trials: 1, mean: 12, sd: null, interval: null })
    expect(scoreSkill({ kind: 'pegs', trials: trials([20], [25]) })).toMatchObject({ interval: null })
    expect(scoreSkill({ kind: 'pegs', trials: trials([20, 21], []) })).toMatchObject({
      index: null,
      interval: null,
    })
    expect(scoreSkill({ kind: 'dots', trials: trials([0, 0], [0, 0]) })).toMatchObject({
      index: null,
      interval: null,
    })
  })

  // A standard deviation of 0 says nothing about the spread, so no interval can be given (methods, caution on SD = 0).
  it('has no interval when no trial differs, and says so, for an interval of one point claims certainty', () => {
    const score = scoreSkill({ kind: 'pegs', trials: trials([20, 20, 20], [25, 25, 25]) })
    expect(score.index).toBeCloseTo(-100 / 9, 9)
    expect([score.interval, score.left.interval, score.right.interval]).toEqual([null, null, null])
    expect(skillCautions(score).join(' ')).toContain('too alike to say how sure the gap is')
    expect(skillCautions(score).join(' ')).not.toContain('approximate')
  })

  // 20.1 + 20.1 + 20.1 is not 60.3 to the last digit in binary, and the deviation then not quite 0.
  it.each([
    ['tenths', 'pegs', [20.1, 20.1, 20.1], [25.7, 25.7, 25.7]],
    ['counts', 'tapping', [80, 80], [95, 95]],
    ['one hand that does nothing', 'dots', [0, 0, 0], [31, 33, 35]],
  ] as const)('has no interval for trials alike: %s', (_what, kind, left, right) => {
    const score = scoreSkill({ kind, trials: trials([...left], [...right]) })
    expect(score.index).not.toBeNull()
    expect(score.interval).toBeNull()
    expect(skillCautions(score).join(' ')).toContain('too alike')
  })

  it('keeps its interval when the trials of one hand alone differ', () => {
    const score = scoreSkill({ kind: 'pegs', trials: trials([20, 20, 20], [24, 25, 26]) })
    expect(score.left.interval).toBeNull()
    expect(score.interval!.high).toBeGreaterThan(score.interval!.low)
    expect(skillCautions(score).join(' ')).not.toContain('too alike')
  })

  it('keeps interrupted and untaken trials out of every figure', () => {
    const clean = trials([20, 21, 22], [25, 24, 26])
    const disturbed = [trial('left', 90, { interrupted: true }), ...clean, trial('right', null)]
    const score = scoreSkill({ kind: 'pegs', trials: disturbed })
    expect({ ...score, interrupted: 0 }).toEqual(scoreSkill({ kind: 'pegs', trials: clean }))
    expect(score.interrupted).toBe(1)
    expect(countedTrials(disturbed, 'left')).toHaveLength(3)
  })

  const taken = fc.record({
    hand: fc.constantFrom(...hands),
    value: fc.option(fc.integer({ min: 1, max: 6000 }).map((tenths) => tenths / 10)),
    interrupted: fc.boolean(),
    confirmed: fc.boolean(),
  })
  const kinds = fc.constantFrom('pegs' as const, 'tapping' as const, 'dots' as const)

  it('negates the index and mirrors its interval when the hands are swapped', () => {
    fc.assert(
      fc.property(kinds, fc.array(taken, { maxLength: 12 }), (kind, list) => {
        const score = scoreSkill({ kind, trials: list })
        const swapped = list.map((one) => ({
          ...one,
          hand: one.hand === 'left' ? ('right' as const) : ('left' as const),
        }))
        const other = scoreSkill({ kind, trials: swapped })
        expect([other.left, other.right]).toEqual([score.right, score.left])
        if (score.index === null) {
          expect(other.index).toBeNull()
          return
        }
        expect(other.index).toBeCloseTo(-score.index, 9)
        if (score.interval === null) {
          expect(other.interval).toBeNull()
          return
        }
        expect(other.interval?.low).toBeCloseTo(-score.interval.high, 6)
        expect(other.interval?.high).toBeCloseTo(-score.interval.low, 6)
      }),
    )
  })

  it('does not care about the order of trials, to the last digit', () => {
    const shuffled = fc
      .array(taken, { maxLength: 12 })
      .chain((list) => fc.tuple(fc.constant(list), fc.shuffledSubarray(list, { minLength: list.length })))
    fc.assert(
      fc.property(kinds, shuffled, (kind, [list, other]) => {
        expect(scoreSkill({ kind, trials: other })).toEqual(scoreSkill({ kind, trials: list }))
      }),
    )
  })

  it('holds the index in its interval, and both within the scale', () => {
    fc.assert(
      fc.property(kinds, fc.array(taken, { maxLength: 12 }), (kind, list) => {
        const { index, interval } = scoreSkill({ kind, trials: list })
        if (index === null || interval === null) return
        expect(interval.low).toBeLessThanOrEqual(index)
        expect(interval.high).toBeGreaterThanOrEqual(index)
        expect(Math.min(interval.low, index)).toBeGreaterThanOrEqual(-100)
        expect(Math.max(interval.high, index)).toBeLessThanOrEqual(100)
      }),
    )
  })
})

describe('skillCautions', () => {
  const cautionsFor = (left: number[], right: number[]) =>
    skillCautions(scoreSkill({ kind: 'pegs', trials: trials(left, right) })).join(' ')

  it('warns of fewer than three trials a hand, and of a hand without any', () => {
    expect(cautionsFor([20, 21], [25, 26, 24])).toContain('Fewer than 3')
    expect(cautionsFor([20, 21, 22], [25, 26, 24])).not.toContain('Fewer than 3')
    expect(cautionsFor([20, 21, 22], [])).toContain('no index')
  })
})

// Limits are clinic rules without a source, so wide that only slips and rare days meet them.
describe('unlikelyTrial', () => {
  it.each([
    ['no time at all for ten pegs', 'pegs', 0, 10, null],
    ['an hour for ten pegs', 'pegs', 3600, 10, null],
    ['a slipped point: 2.2 s for ten pegs', 'pegs', 2.2, 10, null],
    ['400 taps in 10 s', 'tapping', 400, null, 10],
    ['no tap in 10 s', 'tapping', 0, null, 10],
    ['200 dots in 20 s', 'dots', 200, null, 20],
  ] as const)('asks about %s', (_what, kind, value, pegs, seconds) => {
    expect(unlikelyTrial(kind, value, { pegs, seconds })).toMatch(/Is that the value\?$/)
  })

  it.each([
    ['22.4 s for ten pegs', 'pegs', 22.4, 10, null],
    ['23.46 s for nine pegs, the mean of Saudi boys (Omar et al.)', 'pegs', 23.46, 9, null],
    ['a slow hand: 90 s for ten pegs', 'pegs', 90, 10, null],
    ['45 taps in 10 s', 'tapping', 45, null, 10],
    ['34 dots in 20 s', 'dots', 34, null, 20],
    ['a trial not taken', 'pegs', null, 10, null],
  ] as const)('asks nothing about %s', (_what, kind, value, pegs, seconds) => {
    expect(unlikelyTrial(kind, value, { pegs, seconds })).toBeNull()
  })

  it('names the value, the task and what is likely', () => {
    expect(unlikelyTrial('pegs', 3600, { pegs: 10, seconds: null })).toBe(
      '3600 s for 10 pegs is unusual (5 to 120 s is likely). Is that the value?',
    )
    expect(unlikelyTrial('tapping', 400, { pegs: null, seconds: 10 })).toBe(
      '400 taps in 10 s is unusual (5 to 100 is likely). Is that the value?',
    )
  })

  it('leaves a trial alone that was confirmed or interrupted', () => {
    const given = details({
      trials: [
        trial('left', 3600),
        trial('left', 3600, { confirmed: true }),
        trial('right', 0, { interrupted: true }),
        trial('right', 20),
      ],
    })
    expect(unansweredTrials(given)).toEqual([0])
  })
})

describe('nextTrial', () => {
  const runs = (startHand: Hand): Hand[] => {
    const list: SkillTrial[] = []
    for (;;) {
      const next = nextTrial({ startHand, trials: list })
      if (!next) return list.map(({ hand }) => hand)
      list.push(trial(next.hand, 20))
    }
  }

  it('gives each hand five trials, and each round starts with the other hand', () => {
    expect(
      runs('left')
        .map((hand) => hand[0])
        .join(''),
    ).toBe('lrrllrrllr')
    expect(
      runs('right')
        .map((hand) => hand[0])
        .join(''),
    ).toBe('rllrrllrrl')
  })

  it('says when three a hand are there', () => {
    const two = trials([1, 1], [1, 1])
    expect(nextTrial({ startHand: 'left', trials: two })).toEqual({ hand: 'left', round: 3, enough: false })
    expect(nextTrial({ startHand: 'left', trials: trials([1, 1, 1], [1, 1, 1]) })).toMatchObject({
      enough: true,
    })
  })

  it('takes an interrupted trial again with the same hand', () => {
    const list = [trial('left', 20), trial('right', 50, { interrupted: true })]
    expect(nextTrial({ startHand: 'left', trials: list })).toMatchObject({ hand: 'right', round: 1 })
  })
})
