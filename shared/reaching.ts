import { chanceIndex, signTest } from './signTest.ts'
import { lateralityQuotient } from './laterality.ts'
import { reachPlaces, type Reach, type ReachingScore, type ReachPlace } from './measures.ts'
import type { Hand } from './roles.ts'

/*
 * Card reaching across the midline. Bishop DVM, Ross VA, Daniels MS, Bright P. 1996. Br J Psychol 87:269-285 (abstract
 * read). Seven places: conference abstract of Carlier et al.; six cards a place in their French version; three cards a
 * place and places 30 degrees apart are from memory. No published bands were found: counts are shown, never a label.
 */

/**
 * Evenly spread 32-bit numbers from one seed: the counter of SplitMix (Steele, Lea & Flood 2014) in 32 bits with the
 * closing mix of MurmurHash3. For the order of cards, not for secrets.
 */
function numbersOf(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x9e3779b9) >>> 0
    let mixed = state
    mixed = Math.imul(mixed ^ (mixed >>> 16), 0x85ebca6b)
    mixed = Math.imul(mixed ^ (mixed >>> 13), 0xc2b2ae35)
    return (mixed ^ (mixed >>> 16)) >>> 0
  }
}

/**
 * The order of places for one occasion: each of the seven `cardsPerPlace` times, shuffled from the back (Fisher-Yates)
 * by the seed. The same seed always gives the same order; the share of numbers lost to rounding is below 1 in 10⁸.
 */
export function reachOrder(seed: number, cardsPerPlace: 3 | 6): ReachPlace[] {
  const order = reachPlaces.flatMap((place) => Array<ReachPlace>(cardsPerPlace).fill(place))
  const next = numbersOf(seed)
  for (let last = order.length - 1; last > 0; last -= 1) {
    const other = Math.floor((next() / 2 ** 32) * (last + 1))
    const moved = order[last]!
    order[last] = order[other]!
    order[other] = moved
  }
  return order
}

export interface ReachCount {
  count: number
  of: number
}

/** Per cent of the reaches counted; null when none was. */
export const reachRate = ({ count, of }: ReachCount): number | null => (of === 0 ? null : (100 * count) / of)

const midlinePlace = 4
const isFarSide = (place: ReachPlace, hand: Hand) =>
  hand === 'left' ? place > midlinePlace : place < midlinePlace

/**
 * Reaches of one hand into the far side (crossing), its own side and the middle, of those counted there. A lost reach
 * is in neither number.
 */
export function reachesOf(
  reaches: readonly Reach[],
  hand: Hand,
): Record<'crossing' | 'nearSide' | 'midline', ReachCount> {
  const counted = reaches.filter((reach) => reach.hand !== null)
  const among = (isThere: (place: ReachPlace) => boolean): ReachCount => {
    const there = counted.filter((reach) => isThere(reach.place))
    return { count: there.filter((reach) => reach.hand === hand).length, of: there.length }
  }
  return {
    crossing: among((place) => isFarSide(place, hand)),
    nearSide: among((place) => place !== midlinePlace && !isFarSide(place, hand)),
    midline: among((place) => place === midlinePlace),
  }
}

/**
 * Counts, index and rates of the reaches at hand; a reach that changed hands counts for the hand that took the card
 * first. Chance limits and p by the exact two-sided sign test at 5 %: 15 of 21 with one hand is within chance (p .078),
 * 16 is not (p .027).
 */
export function scoreReaching(reaches: readonly Reach[]): ReachingScore {
  const countOf = (hand: Hand | null, among = reaches) => among.filter((reach) => reach.hand === hand).length
  const left = countOf('left')
  const right = countOf('right')
  const preferred = left === right ? null : left > right ? 'left' : 'right'
  const rates = preferred === null ? null : reachesOf(reaches, preferred)
  return {
    kind: 'reaching',
    left,
    right,
    lost: countOf(null),
    swapped: reaches.filter((reach) => reach.swapped).length,
    index: lateralityQuotient({ left, right }),
    chance: chanceIndex(left + right),
    pTwoSided: signTest({ plus: right, minus: left }).twoSided,
    preferred,
    crossing: rates?.crossing ?? null,
    nearSide: rates?.nearSide ?? null,
    midline: rates?.midline ?? null,
    places: reachPlaces.map((place) => {
      const here = reaches.filter((reach) => reach.place === place)
      return { place, left: countOf('left', here), right: countOf('right', here), lost: countOf(null, here) }
    }),
  }
}

/** Under this age not reaching across is not a finding (years; from memory). */
export const crossingExpectedFrom = 6

export const reachingCautions = {
  young: 'Under six, many children do not reach across the middle yet: that is not a finding (from memory).',
  specific:
    'A weak preference in reaching is seen in younger children as well as in children with difficulties of language or coordination: it asks for a closer look and names no cause (Hill & Bishop 1998).',
  task: 'Where the cards lie and how far they are changes how often children reach across.',
  noBands: 'No published bands exist for these counts, so counts are shown and no label.',
} as const

/** What must be read with the counts of a child of this age. */
export const reachingCautionsAt = (ageInYears: number): string[] => [
  ...(ageInYears < crossingExpectedFrom ? [reachingCautions.young] : []),
  reachingCautions.specific,
  reachingCautions.task,
  reachingCautions.noBands,
]
