import {
  earActions,
  footActions,
  type EarAction,
  type FootAction,
  type Side,
  type SideSummary,
  type SidesDetails,
  type SidesScore,
  type Tries,
} from './measures.ts'

/*
 * Foot, eye and ear. Actions after the four-item subsets of Coren and of Porac & Coren, right +1, left −1, both 0 (from
 * memory); sighting through a hole, three tries, disagreement is mixed (a glossary page, second hand). Far and near are
 * kept apart: they hardly agree (kappa .12, conference abstract).
 */

export const footActionLabels: Record<FootAction, string> = {
  kick: 'Kicks a ball',
  hop: 'Hops on one foot',
  step_up: 'Steps up onto a step',
  pebble: 'Picks up a small thing with the toes',
}
export const earActionLabels: Record<EarAction, string> = {
  listen: 'Listens for a quiet sound behind a door',
  phone: 'Holds a phone to the ear',
}

/** One side of several tries: mixed when they disagree, null when none was done. */
export function sideOfTries(tries: Readonly<Tries>): Side | null {
  const seen = new Set(tries.filter((side) => side !== null))
  const [side] = seen
  if (side === undefined) return null
  return seen.size === 1 ? side : 'mixed'
}

const pointOf: Record<Side, number> = { left: -1, mixed: 0, right: 1 }

/**
 * Sum of the actions done, right +1, left −1, mixed 0, and the side of the sum; a sum of 0 is mixed. Actions not done
 * leave both the sum and the count.
 */
export function summariseSides(actions: readonly (Side | null)[]): SideSummary {
  const done = actions.filter((side) => side !== null)
  const sum = done.reduce((total, side) => total + pointOf[side], 0)
  if (done.length === 0) return { sum, answered: 0, side: null, index: null }
  const side = sum < 0 ? 'left' : sum > 0 ? 'right' : 'mixed'
  return { sum, answered: done.length, side, index: (100 * sum) / done.length }
}

export function scoreSides({ foot, eye, ear }: Pick<SidesDetails, 'foot' | 'eye' | 'ear'>): SidesScore {
  return {
    kind: 'sides',
    foot: summariseSides(footActions.map((action) => sideOfTries(foot[action]))),
    eyeFar: summariseSides([sideOfTries(eye.far)]),
    eyeNear: summariseSides([sideOfTries(eye.near)]),
    ear: summariseSides(earActions.map((action) => sideOfTries(ear[action]))),
  }
}

/** Do two sides differ? Null when either is mixed or missing. */
export function areCrossed(one: Side | null, other: Side | null): boolean | null {
  if (one === null || other === null || one === 'mixed' || other === 'mixed') return null
  return one !== other
}

/** Hand with eye, and hand with foot: true, false, or null where it cannot be told. A description, never a deficit. */
export const crossedLaterality = (sides: { hand: Side | null; eye: Side | null; foot: Side | null }) => ({
  handEyeCrossed: areCrossed(sides.hand, sides.eye),
  handFootCrossed: areCrossed(sides.hand, sides.foot),
})

/** Must stand wherever crossed sides are shown. Ferrero, West & Vadillo 2017, PLoS ONE 12:e0183618 (abstract read). */
export const crossedCaution =
  'Different sides for hand, eye and foot are ordinary. Across 26 articles and 3,578 children of 5 to 12, no reliable link with school achievement or intelligence was found (Ferrero, West & Vadillo 2017). Record it; it needs no training.'

/** Packheiser et al. 2020, Sci Rep 10:14488 (abstract read): 164 studies, 145,135 people. */
export const leftFootedPercent = { leftHanders: 60.1, rightHanders: 3.2 } as const
/** Bourassa, McManus & Bryden 1996, Laterality 1:5-34 (abstract read): 54,087 people. */
export const leftEyedPercent = { leftHanders: 57.14, rightHanders: 34.43, everybody: 36.53 } as const
export const leftHandedShareOfEyeStudies = 0.0925

export const expectedRates = {
  foot: `About ${leftFootedPercent.leftHanders} % of left-handers and ${leftFootedPercent.rightHanders} % of right-handers are left-footed (145,135 people, Packheiser et al. 2020). The foot settles later than the hand.`,
  eye: `About ${leftEyedPercent.leftHanders} % of left-handers and ${leftEyedPercent.rightHanders} % of right-handers are left-eyed (54,087 people, Bourassa, McManus & Bryden 1996), so about 43 % of left-handers sight with the right eye.`,
  eyeDistance:
    'Sighting far away comes out much the same on another day (kappa .72); far and near hardly agree (.12, conference abstract), so each has its own line and the distance is written down.',
} as const
