import { describe, expect, it } from 'vitest'
import {
  commonPracticeRates,
  commonPracticeSource,
  expectedInGroup,
  generalRate,
  maleOddsRatio,
  publishedRates,
  throughOdds,
} from '../../shared/familyHandedness.ts'

const published = (pair: string) => publishedRates.find((rate) => rate.pair === pair)?.percent
const common = (label: RegExp) => commonPracticeRates.find((rate) => label.test(rate.label))?.percent

describe('rates', () => {
  // McManus & Bryden 1992; decimals from memory, whole percents read at second hand.
  it('FAM-03 to FAM-05: published, by the parents’ hands', () => {
    expect([published('both_right'), published('one_left'), published('both_left')]).toEqual([
      9.5, 19.5, 26.1,
    ])
  })

  it('FAM-06 to FAM-08: common practice, no source, kept apart', () => {
    expect([common(/general/), common(/^Father left/), common(/^Both parents right/)]).toEqual([10, 17, 10])
    expect(commonPracticeSource).toBe('Common practice, no source')
  })
})

describe('odds', () => {
  // Odds ratio: Papadatou-Pastou et al. 2008 (abstract read); the 9 % is invented. By hand: 0.09/0.91 · 1.23.
  it('FAM-01: an odds ratio of 1.23 takes 9 % to 10.85 %, not to 11.07 %', () => {
    expect(throughOdds(0.09, maleOddsRatio.ratio)).toBeCloseTo(0.10845498187518368, 6)
  })

  it('goes back through the inverse ratio, and refuses what is no probability or ratio', () => {
    expect(throughOdds(throughOdds(0.3, 1.4), 1 / 1.4)).toBeCloseTo(0.3, 12)
    for (const [probability, ratio] of [
      [0, 2],
      [1, 2],
      [-0.1, 2],
      [Number.NaN, 2],
      [0.5, 0],
      [0.5, -1],
    ] as const)
      expect(() => throughOdds(probability, ratio)).toThrow(RangeError)
  })

  // 10.6 %: Papadatou-Pastou et al. 2020 (abstract read).
  it('FAM-02: of 30 children 3.18 are expected, at least one with 96.5 %', () => {
    const { expected, atLeastOne } = expectedInGroup(generalRate.percent / 100, 30)
    expect(expected).toBeCloseTo(3.18, 6)
    expect(atLeastOne).toBeCloseTo(0.9653162885971305, 6)
  })
})
