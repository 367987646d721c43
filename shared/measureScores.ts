import { scoreSkill, countedTrials, unansweredTrials } from './handSkill.ts'
import type { MeasureOptions } from './measureSchemas.ts'
import type {
  MeasureDetails,
  MeasureKind,
  MeasureScore,
  SeatingDetails,
  SidesDetails,
  Tries,
} from './measures.ts'
import { scoreReaching } from './reaching.ts'
import { scoreSeating } from './seatingFit.ts'
import { scoreSides } from './sides.ts'

/** The way each kind is taken and scored now, stored with every measure. */
export const methodVersions: Record<MeasureKind, string> = {
  reaching: 'reaching-7.v1',
  pegs: 'pegs.v1',
  tapping: 'tapping.v1',
  dots: 'dots.v1',
  sides: 'sides.v1',
  seating: 'seating-en1729.v1',
}

/** The score of the trials at hand, computed alike in browser and server. */
export function scoreMeasure(details: MeasureDetails): MeasureScore {
  switch (details.kind) {
    case 'reaching':
      return scoreReaching(details.reaches)
    case 'pegs':
    case 'tapping':
    case 'dots':
      return scoreSkill(details)
    case 'sides':
      return scoreSides(details)
    case 'seating':
      return scoreSeating(details)
  }
}

/** Usual set-up where nothing else is asked for: clinic rules after the published tasks, 20 to 30 s for counts. */
export const usualOptions = { cardsPerPlace: 3, pegs: 10, tappingSeconds: 20, dotsSeconds: 20 } as const

const noTries = (): Tries => [null, null, null]

const emptySides = (): SidesDetails => ({
  kind: 'sides',
  foot: { kick: noTries(), hop: noTries(), step_up: noTries(), pebble: noTries() },
  eye: { far: noTries(), near: noTries() },
  eyeFarMetres: null,
  ear: { listen: noTries(), phone: noTries() },
})

const emptySeating = (): SeatingDetails => ({
  kind: 'seating',
  poplitealCm: null,
  statureCm: null,
  shoeCm: null,
  seatHeightCm: null,
  seatDepthCm: null,
  buttockPoplitealCm: null,
  elbowHeightCm: null,
  shoulderHeightCm: null,
  deskHeightCm: null,
  feetFlat: null,
  leftClearanceCm: null,
  neighbourHand: null,
  lightSide: null,
})

/**
 * A measure with nothing recorded. `seed` is an unsigned 32-bit number: the order of cards, and the lot for the hand that
 * starts when none is asked for. Options that a kind does not know are ignored.
 */
export function emptyDetails(
  kind: MeasureKind,
  options: Partial<MeasureOptions>,
  seed: number,
): MeasureDetails {
  const startHand = options.startHand ?? (seed % 2 === 0 ? 'left' : 'right')
  switch (kind) {
    case 'reaching':
      return { kind, cardsPerPlace: options.cardsPerPlace ?? usualOptions.cardsPerPlace, seed, reaches: [] }
    case 'pegs':
      return { kind, startHand, pegs: options.pegs ?? usualOptions.pegs, seconds: null, trials: [] }
    case 'tapping':
    case 'dots': {
      const usual = kind === 'tapping' ? usualOptions.tappingSeconds : usualOptions.dotsSeconds
      return { kind, startHand, pegs: null, seconds: options.seconds ?? usual, trials: [] }
    }
    case 'sides':
      return emptySides()
    case 'seating':
      return emptySeating()
  }
}

/** Is there anything that counts: a reach seen, a trial taken through, a try or a measurement? */
export function hasFindings(details: MeasureDetails): boolean {
  switch (details.kind) {
    case 'reaching':
      return details.reaches.some(({ hand }) => hand !== null)
    case 'pegs':
    case 'tapping':
    case 'dots':
      return countedTrials(details.trials, 'left').length + countedTrials(details.trials, 'right').length > 0
    case 'sides':
      return [details.foot, details.eye, details.ear]
        .flatMap((actions) => Object.values<Tries>(actions))
        .some((tries) => tries.some((side) => side !== null))
    case 'seating': {
      const { kind: _kind, ...measured } = details
      return Object.values(measured).some((value) => value !== null)
    }
  }
}

/** What still stands in the way of locking, by field; empty when it may be locked. */
export function lockProblems(details: MeasureDetails, notDoneReason: string | null): Record<string, string> {
  const found = hasFindings(details)
  if (!found && notDoneReason === null)
    return { details: 'Nothing is recorded yet. Record at least one, or write why it was not done.' }
  if (found && notDoneReason !== null)
    return {
      notDoneReason: 'Something was recorded, so it was done. Write why it stopped in the comment instead.',
    }
  if (details.kind !== 'pegs' && details.kind !== 'tapping' && details.kind !== 'dots') return {}
  return Object.fromEntries(
    unansweredTrials(details).map((at) => [
      `details.trials[${at}].value`,
      'This value is unusual. Confirm it, correct it, or mark the trial as interrupted.',
    ]),
  )
}
