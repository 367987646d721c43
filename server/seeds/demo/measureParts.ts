import type {
  EarAction,
  EyeAction,
  FootAction,
  ReachPlace,
  SeatingDetails,
  Side,
  SidesDetails,
  SkillKind,
  Tries,
} from '../../../shared/measures.ts'
import { reachPlaces } from '../../../shared/measures.ts'
import { emptyDetails, usualOptions } from '../../../shared/measureScores.ts'
import type { DemoMeasure, DemoReach } from './assessmentTypes.ts'
import type { Offset } from './demoTypes.ts'
import type { StaffKey } from './people.ts'

interface Parts {
  comment?: string
}

const one = (
  child: number,
  measuredDay: Offset,
  by: StaffKey,
  details: DemoMeasure['details'],
  { comment }: Parts = {},
): DemoMeasure => ({ child, measuredDay, by, details, notDoneReason: null, comment: comment ?? null })

const reaches: Record<string, DemoReach> = {
  L: { hand: 'left', swapped: false },
  R: { hand: 'right', swapped: false },
  l: { hand: 'left', swapped: true },
  r: { hand: 'right', swapped: true },
  '-': { hand: null, swapped: false },
}

/** A seed of its own for each occasion, so that the cards lie in the same order whenever the demo is made. */
const seedOf = (child: number, day: Offset) => child * 1_000_003 - day * 7_919

/**
 * Reaching across the midline. Seven groups, from the child's far left to the far right, of what each card was taken
 * with: L left, R right, small when the card changed hands on the way, - not seen.
 */
export function reaching(
  child: number,
  day: Offset,
  by: StaffKey,
  places: string,
  parts?: Parts,
): DemoMeasure {
  const groups = places.split(' ')
  const reached = Object.fromEntries(
    reachPlaces.map((place, index) => [
      place,
      [...(groups[index] ?? '')].map((code) => {
        const reach = reaches[code]
        if (!reach) throw new Error(`Child ${child}: ${code} is no reach`)
        return reach
      }),
    ]),
  ) as Record<ReachPlace, DemoReach[]>
  return one(child, day, by, { kind: 'reaching', seed: seedOf(child, day), reached }, parts)
}

/** Trials in the order taken: 'L24.1 R29.8 …', seconds or a count; a star marks an interrupted one. */
const skill =
  (kind: SkillKind) =>
  (child: number, day: Offset, by: StaffKey, trials: string, parts?: Parts): DemoMeasure => {
    const taken = trials.split(' ').map((trial) => {
      const [, hand, value, star] = /^([LR])([\d.]+)(\*?)$/.exec(trial) ?? []
      if (hand === undefined || value === undefined) throw new Error(`Child ${child}: ${trial} is no trial`)
      return {
        hand: hand === 'L' ? ('left' as const) : ('right' as const),
        value: Number(value),
        interrupted: star === '*',
        confirmed: false,
      }
    })
    const details = {
      kind,
      startHand: taken[0]?.hand ?? 'left',
      pegs: kind === 'pegs' ? usualOptions.pegs : null,
      seconds:
        kind === 'pegs' ? null : kind === 'tapping' ? usualOptions.tappingSeconds : usualOptions.dotsSeconds,
      trials: taken,
    }
    return one(child, day, by, details, parts)
  }

/** Ten pegs, in seconds. */
export const pegs = skill('pegs')
/** Taps in twenty seconds. */
export const tapping = skill('tapping')
/** Dots in twenty seconds. */
export const dots = skill('dots')

const sideCodes: Record<string, Side | null> = { L: 'left', R: 'right', M: 'mixed', '-': null }

function tries(given: string): Tries {
  const [first, second, third] = [...given].map((code) => sideCodes[code])
  if (first === undefined || second === undefined || third === undefined)
    throw new Error(`${given} are not three tries`)
  return [first, second, third]
}

/** Three tries each of foot, eye and ear: L, R, M both, - not done. The far target stands four metres off. */
export const sides = (
  child: number,
  day: Offset,
  by: StaffKey,
  foot: Record<FootAction, string>,
  eye: Record<EyeAction, string>,
  ear: Record<EarAction, string> = { listen: '---', phone: '---' },
  parts?: Parts,
): DemoMeasure => {
  const details: SidesDetails = {
    kind: 'sides',
    foot: {
      kick: tries(foot.kick),
      hop: tries(foot.hop),
      step_up: tries(foot.step_up),
      pebble: tries(foot.pebble),
    },
    eye: { far: tries(eye.far), near: tries(eye.near) },
    eyeFarMetres: 4,
    ear: { listen: tries(ear.listen), phone: tries(ear.phone) },
  }
  return one(child, day, by, details, parts)
}

/** Lengths in cm; what is not named was not measured. */
export const seating = (
  child: number,
  day: Offset,
  by: StaffKey,
  measured: Partial<Omit<SeatingDetails, 'kind'>>,
  parts?: Parts,
): DemoMeasure => {
  const blank = emptyDetails('seating', {}, 0)
  if (blank.kind !== 'seating') throw new Error('A seating measure of another kind')
  return one(child, day, by, { ...blank, ...measured }, parts)
}

/** A part that was not done, and why. */
export const notDone = (
  child: number,
  day: Offset,
  by: StaffKey,
  kind: SkillKind,
  notDoneReason: string,
): DemoMeasure => {
  const blank = emptyDetails(kind, { startHand: 'left' }, 0)
  if (blank.kind !== kind) throw new Error('A measure of another kind')
  return { ...one(child, day, by, blank), notDoneReason }
}
