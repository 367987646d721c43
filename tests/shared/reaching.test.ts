import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { reachPlaces, type Reach, type ReachPlace } from '../../shared/measures.ts'
import {
  reachesOf,
  reachingCautions,
  reachingCautionsAt,
  reachOrder,
  reachRate,
  scoreReaching,
} from '../../shared/reaching.ts'
import type { Hand } from '../../shared/roles.ts'

const seeds = fc.integer({ min: 0, max: 2 ** 32 - 1 })
const decks = fc.constantFrom(3 as const, 6 as const)
const reach = (place: number, hand: Hand | null, swapped = false): Reach => ({
  place: place as ReachPlace,
  hand,
  swapped,
})
const reachList = fc.array(
  fc.record({
    place: fc.constantFrom(...reachPlaces),
    hand: fc.constantFrom<(Hand | null)[]>('left', 'right', null),
    swapped: fc.boolean(),
  }),
  { maxLength: 42 },
)
const others = { left: 'right', right: 'left' } as const
const mirrored = (reaches: readonly Reach[]) =>
  reaches.map(({ place, hand, swapped }) => reach(8 - place, hand === null ? null : others[hand], swapped))

describe('reachOrder', () => {
  it('has each place exactly as often as there are cards', () => {
    fc.assert(
      fc.property(seeds, decks, (seed, cards) => {
        const order = reachOrder(seed, cards)
        expect(order).toHaveLength(7 * cards)
        for (const place of reachPlaces) expect(order.filter((one) => one === place)).toHaveLength(cards)
      }),
    )
  })

  // The same generator and shuffle written a second time, in Python with unbounded integers.
  it.each([
    [0, 3, '263475476131643572125'],
    [1, 3, '154763432166725723415'],
    [5, 3, '712541272436476531653'],
    [4_294_967_295, 3, '641754154336567213272'],
    [5, 6, '233174727462165263253525141354574761741663'],
  ] as const)('is fixed by the seed: %d with %d cards', (seed, cards, order) => {
    expect(reachOrder(seed, cards).join('')).toBe(order)
  })

  it('differs between seeds and favours no place anywhere in the order', () => {
    const draws = 2100
    const counts = Array.from({ length: 21 }, () => new Map<number, number>())
    const orders = new Set<string>()
    for (let seed = 0; seed < draws; seed += 1) {
      const order = reachOrder(seed * 2_045_221 + 7, 3)
      orders.add(order.join(''))
      order.forEach((place, at) => counts[at]!.set(place, (counts[at]!.get(place) ?? 0) + 1))
    }
    expect(orders.size).toBe(draws)
    // Pearson's chi-square of each position against an equal share; 27.86 is the .9999 quantile for 6 degrees of freedom.
    for (const count of counts) {
      const expected = draws / 7
      const chi = reachPlaces.reduce(
        (sum, place) => sum + ((count.get(place) ?? 0) - expected) ** 2 / expected,
        0,
      )
      expect(chi).toBeLessThan(27.86)
    }
  })
})

/** Reaches of the left hand and reaches counted, by place from the far left to the far right. */
const occasion = (left: readonly number[], counted: readonly number[]): Reach[] =>
  reachPlaces.flatMap((place) =>
    Array.from({ length: 3 }, (_, at) =>
      reach(place, at >= counted[place - 1]! ? null : at < left[place - 1]! ? 'left' : 'right'),
    ),
  )
const all = [3, 3, 3, 3, 3, 3, 3]

/*
 * Bishop, Ross, Daniels & Bright 1996, Br J Psychol 87:269-285 (abstract read); seven places and the count of the preferred
 * hand from other abstracts; three cards a place from memory. Values worked by hand from the formula.
 */
describe('scoreReaching', () => {
  it.each([
    ['CARD-01 crosses now and then', [3, 3, 3, 3, 2, 1, 0], all, 15, 6, -42.857142857142854, 3, 9],
    ['CARD-02 left throughout', all, all, 21, 0, -100, 9, 9],
    ['CARD-03 does not cross', [3, 3, 3, 2, 0, 0, 0], all, 11, 10, -4.761904761904762, 0, 9],
    [
      'CARD-05 two lost reaches',
      [3, 3, 2, 3, 2, 1, 0],
      [3, 3, 2, 3, 3, 2, 3],
      14,
      5,
      -47.36842105263158,
      3,
      8,
    ],
  ])('%s', (_id, leftHand, counted, left, right, index, count, of) => {
    const score = scoreReaching(occasion(leftHand, counted))
    expect(score).toMatchObject({ left, right, preferred: 'left', crossing: { count, of } })
    expect(score.index).toBeCloseTo(index, 6)
    expect(reachRate(score.crossing!)).toBeCloseTo((100 * count) / of, 9)
    expect(score.lost).toBe(21 - left - right)
  })

  it('CARD-06: nothing recorded gives nulls, never zeros', () => {
    const lost = occasion(
      all.map(() => 0),
      all.map(() => 0),
    )
    for (const reaches of [lost, []]) {
      expect(scoreReaching(reaches)).toMatchObject({
        ...{ left: 0, right: 0, index: null, chance: null, pTwoSided: null },
        ...{ preferred: null, crossing: null, nearSide: null, midline: null },
      })
      expect(reachesOf(reaches, 'left').crossing).toEqual({ count: 0, of: 0 })
    }
    expect(reachRate({ count: 0, of: 0 })).toBeNull()
  })

  it('a right-hander crosses to the left: the mirror of CARD-01', () => {
    const score = scoreReaching(mirrored(occasion([3, 3, 3, 3, 2, 1, 0], all)))
    expect(score).toMatchObject({ left: 6, right: 15, preferred: 'right', crossing: { count: 3, of: 9 } })
    expect(score.index).toBeCloseTo(42.857142857142854, 6)
  })

  it('has no preferred hand and no crossing when both were used alike', () => {
    const score = scoreReaching([reach(1, 'left'), reach(7, 'right')])
    expect(score).toMatchObject({ index: 0, preferred: null, crossing: null, pTwoSided: 1 })
  })

  it('counts a card that changed hands for the hand that took it first', () => {
    expect(scoreReaching([reach(6, 'right', true), reach(1, 'left')])).toMatchObject({ right: 1, swapped: 1 })
  })

  // Exact binomial at one half, two-sided (domain brief: 15 of 21 p .078, 16 of 21 p .027).
  it.each([
    [15, 0.078, true],
    [16, 0.027, false],
  ])('%d of 21 with one hand: p %f', (count, p, withinChance) => {
    const reaches = Array.from({ length: 21 }, (_, at) => reach((at % 7) + 1, at < count ? 'left' : 'right'))
    const score = scoreReaching(reaches)
    expect(score.pTwoSided).toBeCloseTo(p, 3)
    const { low, high } = score.chance!
    expect(score.index! >= low && score.index! <= high).toBe(withinChance)
    expect([low, high]).toEqual([expect.closeTo(-42.857142857, 6), expect.closeTo(42.857142857, 6)])
  })

  it('swaps every figure when hands and places are mirrored', () => {
    fc.assert(
      fc.property(reachList, (reaches) => {
        const score = scoreReaching(reaches)
        const other = scoreReaching(mirrored(reaches))
        expect(other.index).toBe(score.index === null ? null : -score.index + 0)
        expect([other.left, other.right]).toEqual([score.right, score.left])
        expect(other.crossing).toEqual(score.crossing)
        expect(other.nearSide).toEqual(score.nearSide)
        expect(other.midline).toEqual(score.midline)
        expect(other.pTwoSided).toBe(score.pTwoSided)
      }),
    )
  })

  it('does not care about the order of reaches', () => {
    const shuffled = reachList.chain((reaches) =>
      fc.tuple(fc.constant(reaches), fc.shuffledSubarray(reaches, { minLength: reaches.length })),
    )
    fc.assert(
      fc.property(shuffled, ([reaches, other]) => {
        expect(scoreReaching(other)).toEqual(scoreReaching(reaches))
      }),
    )
  })

  it('lost reaches change the number lost and nothing else', () => {
    const lost = fc.array(fc.constantFrom(...reachPlaces), { maxLength: 10 })
    fc.assert(
      fc.property(reachList, lost, (reaches, places) => {
        const bare = scoreReaching(reaches)
        const more = scoreReaching([...reaches, ...places.map((place) => reach(place, null))])
        const without = ({ lost: _lost, places: _places, ...rest }: typeof bare) => rest
        expect(without(more)).toEqual(without(bare))
        expect(more.lost).toBe(bare.lost + places.length)
      }),
    )
  })

  it('adds up: sides and middle make all counted reaches of the preferred hand', () => {
    fc.assert(
      fc.property(reachList, (reaches) => {
        const { crossing, nearSide, midline, preferred, left, right, places } = scoreReaching(reaches)
        expect(places.reduce((sum, place) => sum + place.left + place.right + place.lost, 0)).toBe(
          reaches.length,
        )
        if (!crossing || !nearSide || !midline) {
          expect(preferred).toBeNull()
          return
        }
        expect(crossing.count + nearSide.count + midline.count).toBe(preferred === 'left' ? left : right)
        expect(crossing.of + nearSide.of + midline.of).toBe(left + right)
      }),
    )
  })

  it('is scored in well under 5 ms', () => {
    const reaches = reachOrder(1, 6).map((place) => reach(place, 'left'))
    scoreReaching(reaches)
    const start = performance.now()
    for (let round = 0; round < 100; round += 1) scoreReaching(reaches)
    expect((performance.now() - start) / 100).toBeLessThan(5)
  })
})

// From memory: under six, not crossing is not a finding.
it('says under six that not crossing is no finding, and later no longer', () => {
  expect(reachingCautionsAt(5)).toContain(reachingCautions.young)
  expect(reachingCautionsAt(6)).not.toContain(reachingCautions.young)
  expect(reachingCautionsAt(9)).toContain(reachingCautions.noBands)
})
