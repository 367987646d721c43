import type { FormAnswers, FormDefinition, FormScore, ScoringMethod } from './forms.ts'
import {
  directionOf,
  leastForProvisional,
  leastForScorable,
  type CutOffSet,
  type HandUseAnswer,
  type HandUseStanding,
} from './handUse.ts'
import {
  lateralityQuotient,
  oneMarkScore,
  twoMarkScore,
  type HandCounts,
  type HandMark,
} from './laterality.ts'

/** What a form needs to be scored: its name in the database and its content. */
export interface ScorableForm {
  id: string
  definition: Pick<FormDefinition, 'scoring' | 'items'>
}

const markOf: Record<HandUseAnswer, HandMark> = {
  strong_left: 'left_twice',
  left: 'left_once',
  either: 'both',
  right: 'right_once',
  strong_right: 'right_twice',
  // Never done is no experience: it leaves both sums, where "either" would give a mark to each hand.
  does_not_do: null,
}

/** Veale 2014, Laterality 19(2):164-177: five answers from −100 to +100 (values from memory). */
const fiveValues: Record<HandUseAnswer, number | null> = {
  strong_left: -100,
  left: -50,
  either: 0,
  right: 50,
  strong_right: 100,
  does_not_do: null,
}

/** De Agostini & Dellatolas 1988, as told in a chapter abstract: right 1, both 2, left 3. */
const shownPoints: Record<HandUseAnswer, number | null> = {
  strong_left: 3,
  left: 3,
  either: 2,
  right: 1,
  strong_right: 1,
  does_not_do: null,
}

/** What one answer gives: marks for each hand, or a single value where the method has no marks. */
export type ItemMarks = HandCounts | { value: number }

/** Marks of one answer; null when it is blank or not done, which leaves the score alone. No other answer matters. */
export function itemMarks(method: ScoringMethod, answer: HandUseAnswer | null): ItemMarks | null {
  if (answer === null || answer === 'does_not_do') return null
  if (method === 'mean_of_five' || method === 'demonstrated_actions') {
    const value = (method === 'mean_of_five' ? fiveValues : shownPoints)[answer]
    return value === null ? null : { value }
  }
  const { left, right } = (method === 'one_mark' ? oneMarkScore : twoMarkScore)([markOf[answer]])
  return { left, right }
}

/** Place of the sum of eight demonstrated actions (8 right … 24 left) between −100 (left) and +100 (right). */
export const demonstratedIndex = (total: number): number => (100 * (16 - total)) / 8

/** Degree of preference in the eight actions, 0 to 8, apart from its side. */
export const demonstratedDegree = (total: number): number => Math.abs(total - 16)

interface Least {
  provisional: number
  scorable: number
}

/**
 * Answers a result needs. Clinic rule, not a published one: 6 of 10 for a provisional result and 8 of 10 for a full
 * one, the same shares of a form of another length rounded up. The sum of demonstrated actions means nothing unless
 * each of them was seen.
 */
export function leastAnswers(method: ScoringMethod, itemCount: number): Least {
  if (method === 'demonstrated_actions') return { provisional: itemCount, scorable: itemCount }
  return {
    provisional: Math.ceil((itemCount * leastForProvisional) / 10),
    scorable: Math.ceil((itemCount * leastForScorable) / 10),
  }
}

const sumOf = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0)

function quotientOf(
  method: ScoringMethod,
  hands: HandCounts | null,
  values: readonly number[],
): number | null {
  if (hands) return lateralityQuotient(hands)
  if (values.length === 0) return null
  return method === 'mean_of_five' ? sumOf(values) / values.length : demonstratedIndex(sumOf(values))
}

function standingOf(quotient: number | null, answered: number, least: Least): HandUseStanding {
  if (quotient === null) return 'not_scorable'
  return answered < least.scorable ? 'provisional' : 'scorable'
}

/**
 * Scores the answers to a form by its own method. An answer that is missing or not done yet is never a score: it only
 * lowers the number answered. Answers to items the form does not have are passed over. The quotient is null below the
 * number of answers the clinic asks for (`leastAnswers`); marks and counts are given all the same.
 */
export function scoreForm(
  { id, definition: { scoring, items } }: ScorableForm,
  answers: Readonly<FormAnswers>,
  cutOffs: CutOffSet,
): FormScore {
  const given = items.map((item) => answers[item.id] ?? null).filter((answer) => answer !== null)
  const marks = given.map((answer) => itemMarks(scoring, answer)).filter((mark) => mark !== null)
  const values = marks.flatMap((mark) => ('value' in mark ? mark.value : []))
  const counts = marks.flatMap((mark) => ('value' in mark ? [] : mark))
  const hasMarks = scoring !== 'mean_of_five' && scoring !== 'demonstrated_actions'
  const hands = hasMarks
    ? { left: sumOf(counts.map(({ left }) => left)), right: sumOf(counts.map(({ right }) => right)) }
    : null
  const strong = given.filter((answer) => answer === 'strong_left' || answer === 'strong_right').length
  const sided = strong + given.filter((answer) => answer === 'left' || answer === 'right').length
  const asksAlways = scoring !== 'one_mark' && scoring !== 'demonstrated_actions'

  const least = leastAnswers(scoring, items.length)
  const enough = marks.length >= least.provisional
  const quotient = enough ? quotientOf(scoring, hands, values) : null
  return {
    formVersion: id,
    method: scoring,
    right: hands?.right ?? null,
    left: hands?.left ?? null,
    total: scoring === 'demonstrated_actions' && enough ? sumOf(values) : null,
    answered: marks.length,
    doesNotDo: given.length - marks.length,
    unanswered: items.length - given.length,
    quotient,
    strength: asksAlways && sided > 0 ? strong / sided : null,
    standing: standingOf(quotient, marks.length, least),
    direction: quotient === null ? null : directionOf(quotient, cutOffs),
    cutOffs,
  }
}

/** How far the result can be relied on, in words; null when nothing need be said. */
export function standingWords({
  method,
  answered,
  doesNotDo,
  unanswered,
  standing,
}: Pick<FormScore, 'method' | 'answered' | 'doesNotDo' | 'unanswered' | 'standing'>): string | null {
  if (standing === 'scorable') return null
  const items = answered + doesNotDo + unanswered
  const least = leastAnswers(method, items)
  if (method === 'demonstrated_actions')
    return `Not scorable: the sum needs all ${items} actions, and ${answered} were seen`
  const thing = method === 'mean_of_five' ? 'Incomplete' : 'Provisional'
  return standing === 'provisional'
    ? `${thing}: fewer than ${least.scorable} of ${items} activities answered (clinic rule)`
    : `Not scorable: fewer than ${least.provisional} of ${items} activities answered (clinic rule)`
}

/** Oldfield's deciles of adults, each hand ranked by itself: quotient at which each begins. From memory, not read. */
const leftDeciles = [-28, -42, -54, -66, -76, -83, -87, -90, -92, -100]
const rightDeciles = [48, 60, 68, 74, 80, 84, 88, 92, 95, 100]

export type AdultDecile = { side: 'left' | 'right'; decile: number } | { side: 'middle'; decile: null }

/** What must stand wherever a decile is shown. */
export const decileLabel = 'adult norms, from memory'

/**
 * Decile of a ten-task quotient among adults (Oldfield 1971; cut points from memory, and so is which side a value
 * exactly on one belongs to). Says nothing about a child: show it with `decileLabel` only.
 */
export function adultDecile(quotient: number): AdultDecile {
  const left = leftDeciles.filter((from) => quotient <= from).length
  if (left > 0) return { side: 'left', decile: left }
  const right = rightDeciles.filter((from) => quotient >= from).length
  return right > 0 ? { side: 'right', decile: right } : { side: 'middle', decile: null }
}
