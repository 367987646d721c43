import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { sides, type Side, type SidesDetails, type Tries } from '../../shared/measures.ts'
import { emptyDetails } from '../../shared/measureScores.ts'
import {
  crossedCaution,
  crossedLaterality,
  expectedRates,
  leftEyedPercent,
  leftFootedPercent,
  leftHandedShareOfEyeStudies,
  scoreSides,
  sideOfTries,
  summariseSides,
} from '../../shared/sides.ts'
import { aboveLinePercent, matureGripPercent } from '../../shared/writingPosture.ts'

const maybeSide = fc.constantFrom<(Side | null)[]>(...sides, null)
const tries: fc.Arbitrary<Tries> = fc.tuple(maybeSide, maybeSide, maybeSide)
const other: Record<Side, Side> = { left: 'right', right: 'left', mixed: 'mixed' }
const swapped = (side: Side | null) => (side === null ? null : other[side])

// Three tries, disagreement is mixed: a glossary page, second hand.
describe('sideOfTries', () => {
  it.each<[Tries, Side | null]>([
    [['left', 'left', 'left'], 'left'],
    [['left', null, 'left'], 'left'],
    [[null, 'right', null], 'right'],
    [['left', 'right', 'left'], 'mixed'],
    [['left', 'mixed', 'left'], 'mixed'],
    [['mixed', 'mixed', 'mixed'], 'mixed'],
    [[null, null, null], null],
  ])('%j is %s', (given, side) => expect(sideOfTries(given)).toBe(side))
})

// Coren; Porac & Coren: right +1, left −1, both 0, sum −4 to +4 (from memory). The side of the sum is the clinic's rule.
describe('summariseSides', () => {
  it.each<[string, (Side | null)[], number, number, Side | null, number | null]>([
    ['all left', ['left', 'left', 'left', 'left'], -4, 4, 'left', -100],
    ['all right', ['right', 'right', 'right', 'right'], 4, 4, 'right', 100],
    ['mostly left', ['left', 'left', 'left', 'right'], -2, 4, 'left', -50],
    ['balanced is mixed', ['left', 'right', 'mixed', 'mixed'], 0, 4, 'mixed', 0],
    ['not done leaves sum and count', ['left', null, null, null], -1, 1, 'left', -100],
    ['nothing done has no side', [null, null, null, null], 0, 0, null, null],
  ])('%s', (_what, actions, sum, answered, side, index) =>
    expect(summariseSides(actions)).toEqual({ sum, answered, side, index }),
  )
})

describe('scoreSides', () => {
  const empty = emptyDetails('sides', {}, 1) as SidesDetails

  it('keeps far and near apart and answers null for what was not done', () => {
    const score = scoreSides({
      ...empty,
      foot: { ...empty.foot, kick: ['left', 'left', 'left'], hop: ['left', 'right', 'left'] },
      eye: { far: ['right', 'right', 'right'], near: ['left', 'left', 'right'] },
    })
    expect(score.foot).toEqual({ sum: -1, answered: 2, side: 'left', index: -50 })
    expect([score.eyeFar.side, score.eyeNear.side, score.ear.side]).toEqual(['right', 'mixed', null])
    expect(score.ear.index).toBeNull()
  })

  const taken = fc.record({
    foot: fc.record({ kick: tries, hop: tries, step_up: tries, pebble: tries }),
    eye: fc.record({ far: tries, near: tries }),
    ear: fc.record({ listen: tries, phone: tries }),
  })

  it('negates every index and sum when the sides are swapped', () => {
    const turn = <K extends string>(group: Record<K, Tries>) =>
      Object.fromEntries(
        Object.entries<Tries>(group).map(([action, given]) => [action, given.map(swapped)]),
      ) as Record<K, Tries>
    fc.assert(
      fc.property(taken, ({ foot, eye, ear }) => {
        const score = scoreSides({ foot, eye, ear })
        const turned = scoreSides({ foot: turn(foot), eye: turn(eye), ear: turn(ear) })
        for (const part of ['foot', 'eyeFar', 'eyeNear', 'ear'] as const) {
          expect(turned[part].sum).toBe(-score[part].sum + 0)
          expect(turned[part].index).toBe(score[part].index === null ? null : -score[part].index + 0)
          expect(turned[part].side).toBe(swapped(score[part].side))
          expect(turned[part].answered).toBe(score[part].answered)
        }
      }),
    )
  })

  it('does not care in which order the tries came', () => {
    fc.assert(
      fc.property(tries, ([a, b, c]) => {
        expect(sideOfTries([c, a, b])).toBe(sideOfTries([a, b, c]))
      }),
    )
  })
})

// Crossed when two determined sides differ, undetermined when either is mixed or missing: the definition itself.
describe('crossedLaterality', () => {
  it.each<[string, Side | null, Side | null, Side | null, boolean | null, boolean | null]>([
    ['CROSS-01 all left', 'left', 'left', 'left', false, false],
    ['CROSS-02 right eye', 'left', 'right', 'left', true, false],
    ['CROSS-03 right eye and foot', 'left', 'right', 'right', true, true],
    ['CROSS-04 right hand and foot, left eye', 'right', 'left', 'right', true, false],
    ['CROSS-05 eye mixed', 'left', 'mixed', 'left', null, false],
    ['foot not looked at', 'left', 'left', null, false, null],
    ['hand mixed', 'mixed', 'left', 'right', null, null],
  ])('%s', (_id, hand, eye, foot, handEyeCrossed, handFootCrossed) =>
    expect(crossedLaterality({ hand, eye, foot })).toEqual({ handEyeCrossed, handFootCrossed }),
  )
})

describe('rates that are shown beside crossed sides', () => {
  // Bourassa, McManus & Bryden 1996, Laterality 1:5-34 (abstract): odds ratio 2.53, 36.53 % left-eyed in all.
  const odds = (percent: number) => percent / (100 - percent)

  it('EYE-01: give the odds ratio of the abstract', () => {
    const ratio = odds(leftEyedPercent.leftHanders) / odds(leftEyedPercent.rightHanders)
    expect(ratio).toBeCloseTo(2.53896217161861, 9)
    expect(Math.abs(ratio - 2.53)).toBeLessThan(0.01)
  })

  it('EYE-02: mix to the share of left-eyed people of the abstract', () => {
    const share = leftHandedShareOfEyeStudies
    const mixed = share * leftEyedPercent.leftHanders + (1 - share) * leftEyedPercent.rightHanders
    expect(mixed).toBeCloseTo(36.530675, 9)
    expect(Math.abs(mixed - leftEyedPercent.everybody)).toBeLessThan(0.02)
  })

  // Debian package r-cran-metadat 1.2-0, dat.bourassa1996: 54 samples summed.
  it('EYE-03: are not the crude pooling of the open data, which gives a larger ratio', () => {
    const counts = { leftLeft: 3348, leftRight: 2155, rightLeft: 14_721, rightRight: 33_863 }
    const { leftLeft, leftRight, rightLeft, rightRight } = counts
    expect(leftLeft + leftRight + rightLeft + rightRight).toBe(54_087)
    expect((leftLeft * rightRight) / (leftRight * rightLeft)).toBeCloseTo(3.5737674811824767, 9)
    expect((100 * leftLeft) / (leftLeft + leftRight)).toBeCloseTo(60.83954206796293, 9)
    expect(expectedRates.eye).toContain('57.14 %')
    expect(expectedRates.eye).not.toContain('60.8')
  })

  it('FACT-2: left-footed people, Packheiser et al. 2020, Sci Rep 10:14488 (abstract)', () => {
    expect(leftFootedPercent).toEqual({ leftHanders: 60.1, rightHanders: 3.2 })
    expect(expectedRates.foot).toContain('60.1 %')
  })

  it('FACT-1 and FACT-4: hand above the line, and mature grips (abstracts of 1978 and 1990)', () => {
    expect(aboveLinePercent).toEqual({
      allGrades: { boys: 40, girls: 29 },
      grades5to6: { boys: 59, girls: 43 },
    })
    expect(matureGripPercent).toEqual({ youngest: 48, oldest: 90 })
  })

  // Ferrero, West & Vadillo 2017, PLoS ONE 12:e0183618 (abstract).
  it('come with the caution that they mean nothing for school', () => {
    expect(crossedCaution).toContain('3,578 children')
    expect(crossedCaution).toContain('no training')
  })
})
