import { array, boolean, lazy, mixed, number, type Schema } from 'yup'
import { dayField, type Day } from './days.ts'
import { body, choice, optionalChoice, optionalId, optionalText } from './fields.ts'
import {
  earActions,
  eyeActions,
  footActions,
  measureKinds,
  sides,
  skillKinds,
  type MeasureDetails,
  type MeasureKind,
  type Reach,
  type ReachingDetails,
  type SeatingDetails,
  type SkillDetails,
  type SkillTrial,
} from './measures.ts'
import { reachOrder } from './reaching.ts'
import { hands, type Hand } from './roles.ts'
import { lightSides, yesNo } from './writingObservations.ts'

/** The order of cards is drawn from 32 bits. */
export const seedLimit = 2 ** 32

const wholeNumber = (label: string, min: number, max: number) =>
  number()
    .integer(`${label}: a whole number`)
    .min(min, `${label}: ${min} to ${max}`)
    .max(max, `${label}: ${min} to ${max}`)

const centimetres = (label: string, min: number, max: number) =>
  number()
    .nullable()
    .defined()
    .min(min, `${label}: ${min} to ${max} cm`)
    .max(max, `${label}: ${min} to ${max} cm`)

const cardsPerPlace = () => number<3 | 6>().oneOf([3, 6], 'Choose three or six cards a place')
const pegs = () => wholeNumber('Pegs in one trial', 1, 50)
const seconds = () => wholeNumber('Seconds of one trial', 5, 120)

const choiceOrNull = <T extends string>(label: string, values: readonly T[]) =>
  optionalChoice(label, values).optional().default(null)

/** What a kind needs to begin; what is left out gets the usual value (see `emptyDetails`). */
export const measureOptionsSchema = body({
  cardsPerPlace: cardsPerPlace().nullable().default(null),
  startHand: choiceOrNull('the hand to start with', hands),
  pegs: pegs().nullable().default(null),
  seconds: seconds().nullable().default(null),
}).default(() => ({ cardsPerPlace: null, startHand: null, pegs: null, seconds: null }))

export interface MeasureOptions {
  cardsPerPlace: 3 | 6 | null
  /** Null: by lot. */
  startHand: Hand | null
  pegs: number | null
  seconds: number | null
}

export const measureStartSchema = body({
  kind: choice('what to measure', measureKinds),
  measuredOn: dayField('The date'),
  /** A locked measure that this one replaces. */
  replacesId: optionalId('The earlier measure'),
  options: measureOptionsSchema,
})
export interface MeasureStart {
  kind: MeasureKind
  measuredOn: Day
  replacesId: string | null
  options?: Partial<MeasureOptions>
}

const reach = body({
  place: wholeNumber('The place', 1, 7).required('The place is missing'),
  hand: optionalChoice('the hand', hands),
  swapped: boolean().required('Say whether the card changed hands'),
}).test(
  'lost',
  'A lost reach has no hand, so it cannot have changed hands',
  (given) => !(given.hand === null && given.swapped === true),
)

const reaching = body({
  kind: choice('the kind', ['reaching'] as const),
  cardsPerPlace: cardsPerPlace().required('Choose three or six cards a place'),
  seed: wholeNumber('The seed', 0, seedLimit - 1).required('The seed is missing'),
  reaches: array(reach).required('The reaches are missing').max(42, 'There are at most 42 reaches'),
}).test('order', 'The reaches do not follow the order of the cards. Reload the page.', (given, context) => {
  const { seed, cardsPerPlace: cards, reaches } = given as Partial<ReachingDetails>
  if (!Array.isArray(reaches) || !Number.isInteger(seed) || (cards !== 3 && cards !== 6)) return true
  const order = reachOrder(Number(seed), cards)
  const wrong = reaches.findIndex((one: Partial<Reach> | null, at) => one?.place !== order[at])
  return wrong < 0 || context.createError({ path: `${context.path}.reaches[${wrong}].place` })
})

const trial = body({
  hand: choice('the hand', hands),
  value: number()
    .nullable()
    .defined()
    .min(0, 'A trial cannot be less than 0')
    .max(10_000, 'A trial cannot be more than 10,000'),
  interrupted: boolean().required('Say whether the trial was interrupted'),
  confirmed: boolean().required('Say whether an unusual value was confirmed'),
})

const skill = body({
  kind: choice('the kind', skillKinds),
  startHand: choice('the hand to start with', hands),
  pegs: pegs().nullable().defined(),
  seconds: seconds().nullable().defined(),
  trials: array(trial).required('The trials are missing').max(40, 'At most 40 trials are kept'),
}).test('unit', 'The trials do not belong to this kind', (given, context) => {
  const { kind, pegs: some, seconds: long, trials } = given as Partial<SkillDetails>
  const wrong = (path: string, message: string) =>
    context.createError({ path: `${context.path}.${path}`, message })
  if (kind === 'pegs') {
    if (some === null) return wrong('pegs', 'Enter how many pegs one trial moves')
    return long === null || wrong('seconds', 'Pegs are timed: leave out the length of a trial')
  }
  if (long === null) return wrong('seconds', 'Enter how long one trial lasts')
  if (some !== null) return wrong('pegs', 'Leave out the pegs: this is counted')
  if (!Array.isArray(trials)) return true
  const parts = trials.findIndex(
    (one: Partial<SkillTrial> | null) => typeof one?.value === 'number' && !Number.isInteger(one.value),
  )
  return parts < 0 || wrong(`trials[${parts}].value`, 'A count is a whole number')
})

const tries = array(optionalChoice('the side', sides))
  .required('The tries are missing')
  .length(3, 'There are three tries')
const triesOf = (actions: readonly string[]) =>
  body(Object.fromEntries(actions.map((action) => [action, tries]))).required('The tries are missing')

const sidesDetails = body({
  kind: choice('the kind', ['sides'] as const),
  foot: triesOf(footActions),
  eye: triesOf(eyeActions),
  eyeFarMetres: number()
    .nullable()
    .defined()
    .min(1, 'Distance of the far target: 1 to 20 m')
    .max(20, 'Distance of the far target: 1 to 20 m'),
  ear: triesOf(earActions),
})

const seating = body({
  kind: choice('the kind', ['seating'] as const),
  poplitealCm: centimetres('Floor to hollow of the knee', 15, 60),
  statureCm: centimetres('Body height', 60, 220),
  shoeCm: centimetres('Shoe', 0, 8),
  seatHeightCm: centimetres('Seat height', 15, 90),
  seatDepthCm: centimetres('Seat depth', 15, 70),
  buttockPoplitealCm: centimetres('Buttock to hollow of the knee', 15, 70),
  elbowHeightCm: centimetres('Elbow above the seat', 8, 40),
  shoulderHeightCm: centimetres('Shoulder above the seat', 20, 80),
  deskHeightCm: centimetres('Desk height', 30, 120),
  feetFlat: optionalChoice('whether the feet are flat', yesNo),
  leftClearanceCm: centimetres('Free space on the left', 0, 300),
  neighbourHand: optionalChoice('the neighbour’s writing hand', hands),
  lightSide: optionalChoice('where the light comes from', lightSides),
}).test('shoulder', 'The shoulder is above the elbow: check both', (given, context) => {
  const { elbowHeightCm: elbow, shoulderHeightCm: shoulder } = given as Partial<SeatingDetails>
  if (typeof elbow !== 'number' || typeof shoulder !== 'number' || shoulder > elbow) return true
  return context.createError({ path: `${context.path}.shoulderHeightCm` })
})

const schemaOf: Record<MeasureKind, Schema> = {
  reaching,
  pegs: skill,
  tapping: skill,
  dots: skill,
  sides: sidesDetails,
  seating,
}

const isKind = (kind: unknown): kind is MeasureKind => measureKinds.some((known) => known === kind)

/*
 * The tests of whole details run beside those of their parts (all problems are shown at once), so they meet parts that
 * are missing or malformed.
 */

/** The raw trials of one kind, strictly: no unknown field, no value out of range, reaches in the order of their seed. */
export const measureDetailsSchema = lazy((details: unknown) => {
  const kind = (details as { kind?: unknown } | null | undefined)?.kind
  return isKind(kind)
    ? schemaOf[kind]
    : mixed().test('kind', 'The measure does not say of which kind it is', () => false)
})

export const measureDraftSchema = body({
  measuredOn: dayField('The date'),
  details: measureDetailsSchema,
  notDoneReason: optionalText('Why it was not done', { max: 300 }),
  comment: optionalText('The comment', { max: 1000 }),
})
export interface MeasureDraft {
  measuredOn: Day
  details: MeasureDetails
  notDoneReason: string | null
  comment: string | null
}
