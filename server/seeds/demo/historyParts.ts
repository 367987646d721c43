import {
  emptyHistory,
  type FamilyHands,
  type HistoryDetails,
  type RelativeHand,
} from '../../../shared/histories.ts'
import type { DemoHistory } from './assessmentTypes.ts'
import type { Offset, TimeOfDay } from './demoTypes.ts'
import type { StaffKey } from './people.ts'

/** What most families answer: born at term, nothing new, nothing worrying. Each child's own answers go on top. */
const usual: DemoHistory['details'] = {
  ...withoutDays(emptyHistory),
  gestationWeeks: 39,
  earlySteady: 'no',
  consistency: 'mostly',
  askedToSwitch: 'no',
  punishedForHand: 'no',
  handChanged: 'no',
  injury: 'no',
  seizure: 'no',
  newWeakness: 'no',
  numbness: 'no',
  faceDroop: 'no',
  newHeadache: 'no',
  walkChanged: 'no',
  lostSkill: 'no',
  otherHandHardlyUsed: 'no',
  otherHandFisted: 'no',
  dropsThings: 'no',
  weakerSide: 'no',
  satInTime: 'yes',
  walkedInTime: 'yes',
  tremor: 'no',
  wideMotorDifficulty: 'no',
  visionChecked: 'yes',
  hearingChecked: 'yes',
  pain: 0,
}

function withoutDays({
  handChangedOn: _changed,
  injuryOn: _injured,
  ...rest
}: HistoryDetails): DemoHistory['details'] {
  return rest
}

/** Hands of mother and father, brothers and sisters, and how many of those write with the left. */
export const family = (
  mother: RelativeHand,
  father: RelativeHand,
  siblings = 0,
  leftHandedSiblings = 0,
  rest: Partial<Pick<FamilyHands, 'others' | 'twin'>> = {},
): FamilyHands => ({
  mother,
  father,
  siblings,
  siblingsUnsure: false,
  leftHandedSiblings: siblings === 0 ? null : leftHandedSiblings,
  twin: 'no',
  others: null,
  ...rest,
})

/** The family's hands cannot be told, as for many children who are looked after. */
export const familyNotKnown: FamilyHands = {
  mother: 'unsure',
  father: 'unsure',
  siblings: null,
  siblingsUnsure: true,
  leftHandedSiblings: null,
  twin: 'unsure',
  others: null,
}

type Own = Partial<DemoHistory['details']> & {
  family: FamilyHands
  enjoys: string
}

interface When {
  time?: TimeOfDay
  carer?: number
  handChangedDay?: Offset
  injuryDay?: Offset
}

const history = (
  child: number,
  answeredDay: Offset,
  by: StaffKey,
  askedDay: Offset | null,
  own: Own,
  { time, carer, handChangedDay, injuryDay }: When = {},
): DemoHistory => ({
  child,
  answeredDay,
  time: time ?? (askedDay === null ? '11:10' : '19:40'),
  carer: carer ?? 0,
  by,
  askedDay,
  details: { ...usual, ...own },
  handChangedDay: handChangedDay ?? null,
  injuryDay: injuryDay ?? null,
})

/** Told to a therapist, who wrote it down. */
export const told = (child: number, day: Offset, by: StaffKey, own: Own, when?: When): DemoHistory =>
  history(child, day, by, null, own, when)

/** Answered at home by a carer whom the clinic asked some days before. */
export const answered = (
  child: number,
  [askedDay, answeredDay]: [Offset, Offset],
  by: StaffKey,
  own: Own,
  when?: When,
): DemoHistory => history(child, answeredDay, by, askedDay, own, when)
