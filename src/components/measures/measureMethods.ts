import { neverAveraged, skillCautions } from '@shared/handSkill.ts'
import type { MeasureKind, MeasureScore } from '@shared/measures.ts'
import { reachingCautions } from '@shared/reaching.ts'
import { seatingCautionsOf } from '@shared/seatingFit.ts'
import { crossedCaution, expectedRates } from '@shared/sides.ts'

/** How a measure is worked out and where that comes from: shown wherever its figure is. */
export interface MeasureMethod {
  /** What to have ready and what to say, in a line or two. */
  how: string
  formulas: string[]
  sources: string[]
}

const neighbourCaution =
  'A left-hander wants the left elbow free: the left end of a shared table, or no right-hander on the left. A side tablet made for the right hand does not suit.'
const skillSources = [
  'Index as a share of the total, which takes out overall speed: Schmidt and colleagues (2000), Neuropsychologia 38:529–534.',
]
const spread =
  'Spread is the standard deviation of the trials (n − 1); the interval is the 95 % interval of the mean by Student’s t. Interrupted trials are kept and left out of every figure.'
const countIndex =
  'Index = 100 × (right − left) ÷ (right + left) of the mean counts: minus means left did more.'

export const measureMethods: Record<MeasureKind, MeasureMethod> = {
  reaching: {
    how: 'Cards lie at seven places of an arc around the child, a box stands on the midline. Hands rest on the table between cards. Name a card; record the hand that takes it first.',
    formulas: [
      'Index = 100 × (right − left) ÷ (right + left). Lost reaches are left out.',
      'Crossing, own side and middle: reaches of the hand used more, of all reaches counted at those places.',
      'Chance: two-sided exact sign test at 5 %. Of 21 reaches, 15 with one hand are within chance (p .078), 16 are beyond it (p .027).',
    ],
    sources: [
      'Bishop, Ross, Daniels and Bright (1996), British Journal of Psychology 87:269–285 (abstract).',
      'Seven places, and six cards a place in one version: a conference abstract of Carlier and colleagues. Three cards a place and 30 degrees between places: from memory.',
      'Crossing rises from 3 to 10 years and the far side is reached least: Carlier, Doyen and Lamard (2006), Brain and Cognition 61:255–261.',
    ],
  },
  pegs: {
    how: 'One hand moves the pegs, the other rests. Start at the first touch, stop when the last peg stands. The hands take turns.',
    formulas: [
      'Index = 100 × (left − right) ÷ (left + right) of the mean times: minus means left was faster.',
      spread,
    ],
    sources: [
      'Ten pegs moved from row to row: Annett’s peg board, known from abstracts; no table of times by age could be read.',
      ...skillSources,
    ],
  },
  tapping: {
    how: 'One finger taps as fast as it can while the wrist stays down. The hands take turns.',
    formulas: [countIndex, spread],
    sources: [
      'Speed rises with age, the difference between the hands does not, and it predicts preference poorly: Njiokiktjien and colleagues (1997), 233 children of 5 to 12.',
      ...skillSources,
    ],
  },
  dots: {
    how: 'One dot in each circle, as many as the time allows. Count dots inside their circle. The hands take turns.',
    formulas: [countIndex, spread],
    sources: [
      'Dots in circles: Tapley and Bryden (1985), Neuropsychologia 23:215–221. Trials of 20 seconds in a later analysis.',
      ...skillSources,
    ],
  },
  sides: {
    how: 'Three tries of each. For the eye: a card with a hole held in both hands, both eyes open, then each eye is covered in turn; the eye that keeps the target is the sighting eye.',
    formulas: [
      'Three tries that agree give a side; tries that disagree are mixed. Right counts +1, left −1, mixed 0.',
      'Index = 100 × sum ÷ number of actions answered.',
    ],
    sources: [
      'Foot and ear actions: four-item sets of Coren and of Porac and Coren, from memory. Three sightings of the eye: common practice, no source.',
    ],
  },
  seating: {
    how: 'Feet flat, knees and elbows bent. Hollow of the knee and seat from the floor; elbow and shoulder from the seat; desk from the floor.',
    formulas: [
      'Size mark: by the height of the hollow of the knee, in shoes; by stature only where that is missing, and then two marks may fit.',
      'Seat between (P + S) × cos 30° and (P + S) × cos 5°; P hollow of the knee, S shoe. Depth 0.80 to 0.95 of buttock to hollow of the knee.',
      'Desk between seat + E and seat + 0.8517 × E + 0.1483 × A; E elbow and A shoulder above the seat.',
    ],
    sources: [
      'Size marks of EN 1729-1: marks 1 to 6 from two sizing pages of the 2006 edition; the outer limits of mark 0 and mark 7 and the table height of mark 0 from memory. Check against the edition in force.',
      'Match equations: from memory. Two common seat rules give quite different answers: Castellucci and colleagues (2014), Applied Ergonomics 45:1123–1132.',
      'Fewer than one in five of 74 pupils had an acceptable chair and desk: Parcells and colleagues (1999), Journal of Adolescent Health 24:265–273.',
    ],
  },
}

/** What must be read with the figures, in the words of the rule that made them. */
export function cautionsOf(score: MeasureScore): string[] {
  switch (score.kind) {
    case 'reaching':
      return Object.values(reachingCautions)
    case 'sides':
      return [crossedCaution, ...Object.values(expectedRates)]
    case 'seating':
      return [...seatingCautionsOf(score), neighbourCaution]
    default:
      return [...skillCautions(score), neverAveraged]
  }
}
