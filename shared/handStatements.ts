import type { HandPreference } from './conclusions.ts'
import { compareDays, formatDay } from './days.ts'
import type { InformantComparison, InformantPair } from './informants.ts'
import { rowName, type LateralLineRow } from './lateralLine.ts'
import type { LockedMeasure } from './measureRows.ts'
import { measureKindLabels } from './measures.ts'
import {
  askedAndReached,
  askedStatement,
  chosenHand,
  isSided,
  pointsTo,
  preferenceRows,
  reachedStatement,
} from './preferenceStatements.ts'
import type { Informant } from './questionnaires.ts'
import { crossingExpectedFrom } from './reaching.ts'
import type { Hand } from './roles.ts'
import {
  namedRows,
  once,
  otherHand,
  sideStatements,
  skillStatements,
  type HandStatement,
} from './sideStatements.ts'

const per = (share: number | null) => (share === null ? 'none' : `${Math.round(100 * share)} %`)
const kappaWords = ({ kappa, kappaInterval }: InformantPair) => {
  if (kappa === null) return ''
  const shown = (value: number) => value.toFixed(2).replace('-', '−')
  const interval = kappaInterval
    ? `, 95 % interval ${shown(kappaInterval.low)} to ${shown(kappaInterval.high)}`
    : ''
  return `, kappa ${shown(kappa)}${interval}`
}

/** Who answered, in a sentence. */
const whoSaid: Record<Informant, string> = {
  guardian: 'parent or carer',
  teacher: 'teacher',
  child_demonstrated: 'child showing it',
  therapist: 'therapist watching',
}

const elsewhereDifferent =
  'A child may do things differently at home and at school. Ask about those activities, or watch them.'

function informantStatement(title: string, pair: InformantPair): HandStatement | null {
  if (pair.compared === 0) return null
  const who = `The ${whoSaid[pair.one]} and the ${whoSaid[pair.other]}`
  const figures = `agreement ${per(pair.share)}${kappaWords(pair)}`
  const activities = `${pair.compared} ${pair.compared === 1 ? 'activity' : 'activities'}`
  if (pair.discrepancies === 0)
    return {
      kind: 'agrees',
      text: `${who} answer alike for all of the ${activities} that both answered (${title}).`,
      because: null,
      rowIds: [],
    }
  // Two of two is few and yet all: it must not stand under what agrees.
  return pair.pointedOut || pair.discrepancies >= pair.agreed
    ? {
        kind: 'differs',
        text: `${who} answer differently for ${pair.discrepancies} of ${activities} (${title}; ${figures}).`,
        because: elsewhereDifferent,
        rowIds: [],
      }
    : {
        kind: 'agrees',
        text: `${who} answer alike for ${pair.agreed} of ${activities} (${title}; ${figures}).`,
        because: null,
        rowIds: [],
      }
}

export interface StatementFacts {
  /** Whole years at the newest occasion; null when nothing was recorded yet. */
  ageYears: number | null
  /** Whole years on the day of the newest reaching; left out, `ageYears` stands for it. */
  ageYearsAtReaching?: number | null
  informants: readonly InformantComparison[]
  /** Locked measures, for the parts that were not done and why. */
  measures?: readonly LockedMeasure[]
}

/** Parts whose newest occasion was not done, with the reason that was given. */
function notDoneStatements(measures: readonly LockedMeasure[]): HandStatement[] {
  const kindsTaken = [...new Set(measures.map(({ details }) => details.kind))]
  return kindsTaken.flatMap((kind) => {
    const [newest] = measures
      .filter(({ details }) => details.kind === kind)
      .toSorted((a, b) => compareDays(b.measuredOn, a.measuredOn) || (a.lockedAt < b.lockedAt ? 1 : -1))
    if (!newest || newest.notDoneReason === null) return []
    const text = `Not done on ${formatDay(newest.measuredOn)}: ${measureKindLabels[kind]}. Reason given: ${newest.notDoneReason}`
    return [{ kind: 'open' as const, text, because: null, rowIds: [] }]
  })
}

const kinds: HandStatement['kind'][] = ['agrees', 'differs', 'open']

/**
 * In plain words: what agrees, what disagrees and why that may be ordinary, and what cannot be told yet. Descriptions of
 * what was recorded, never a diagnosis; the therapist concludes.
 */
export function handStatements(rows: readonly LateralLineRow[], facts: StatementFacts): HandStatement[] {
  const notDone = notDoneStatements(facts.measures ?? [])
  if (rows.length === 0) return notDone
  const { asked, reached } = askedAndReached(rows)
  const isYoung = (years: number | null) => years !== null && years < crossingExpectedFrom
  const young = isYoung(facts.ageYears)
  // A child who was five then is not six for what was seen then.
  const youngThen = isYoung(facts.ageYearsAtReaching ?? facts.ageYears)
  const hand = chosenHand(rows)
  const statements = [
    askedStatement(asked),
    reachedStatement(asked, reached, youngThen),
    ...once(
      elsewhereDifferent,
      facts.informants
        .flatMap(({ title, pairs }) => pairs.map((pair) => informantStatement(title, pair)))
        .filter((statement) => statement !== null),
    ),
    ...skillStatements(hand, rows),
    ...sideStatements(hand, rows),
    ...notDone,
    young
      ? {
          kind: 'open' as const,
          text: 'Under six, which hand is chosen is often still weak and changing.',
          because:
            'Steadiness grows with age, and experts differ on the age it is final (Scharoun & Bryden 2014, Front Psychol ' +
            '5:82). Look again in some months before anything is called settled.',
          rowIds: [],
        }
      : null,
  ].filter((statement) => statement !== null)
  return statements.toSorted((a, b) => kinds.indexOf(a.kind) - kinds.indexOf(b.kind))
}

/** A statement as one text, for a report. */
export const statementText = ({ text, because }: HandStatement): string =>
  because === null ? text : `${text} ${because}`

const handOfLabel: Partial<Record<HandPreference, { hand: Hand; settled: boolean }>> = {
  left_settled: { hand: 'left', settled: true },
  right_settled: { hand: 'right', settled: true },
  left_emerging: { hand: 'left', settled: false },
  right_emerging: { hand: 'right', settled: false },
}

/** What does not fit together whatever the label. */
function contradictionsAmong(chosen: readonly LateralLineRow[]): string[] {
  const asked = chosen.filter((row) => row.aspect === 'preference')
  const reached = chosen.filter((row) => row.aspect === 'reaching')
  const found: string[] = []
  if (pointsTo(asked, 'left').length > 0 && pointsTo(asked, 'right').length > 0)
    found.push(
      `The questionnaires point to different hands (${namedRows(asked.filter((row) => row.side !== 'middle'))}).`,
    )
  for (const hand of ['left', 'right'] as const)
    if (pointsTo(asked, hand).length > 0 && pointsTo(reached, otherHand(hand)).length > 0)
      found.push(
        `What was answered points to the ${hand} hand (${namedRows(pointsTo(asked, hand))}) and reaching to the ` +
          `${otherHand(hand)} (${namedRows(pointsTo(reached, otherHand(hand)))}).`,
      )
  return found
}

function contradictionsOfHand(rows: readonly LateralLineRow[], hand: Hand, settled: boolean): string[] {
  const chosen = preferenceRows(rows)
  const label = settled ? 'settled' : 'emerging'
  const found: string[] = []
  const against = pointsTo(chosen, otherHand(hand))
  if (against.length > 0)
    found.push(`The label says ${hand}, ${label}, and this points to the other hand: ${namedRows(against)}.`)
  const neither = chosen.filter((row) => row.side === 'middle')
  if (settled && neither.length > 0)
    found.push(`The label says settled, and this points to neither hand: ${namedRows(neither)}.`)
  if (pointsTo(chosen, hand).length === 0)
    found.push(`Nothing that was asked or seen points to the ${hand} hand so far.`)
  const skilled = rows.filter((row) => row.latest && row.aspect === 'skill' && row.side === otherHand(hand))
  if (skilled.length > 0)
    found.push(
      `The ${otherHand(hand)} hand does better at ${namedRows(skilled)}. Preference and skill are different things; ask ` +
        'whether anyone has pressed for one hand.',
    )
  return found
}

/** From this age in years on, a settled label needs no word of its own. */
const settledFrom = 6

/** A settled label for a young child is a question to answer, not a mistake. Nothing is asked while the age is unknown. */
const settledEarly = (settled: boolean, ageYears: number | null): string[] =>
  settled && ageYears !== null && ageYears < settledFrom
    ? [
        `The label says settled at ${ageYears} years of age. Preference is weak at 3 to 5 and settles later (Scharoun & ` +
          'Bryden 2014, Front Psychol 5:82): say why it is called settled.',
      ]
    : []

/**
 * What a therapist is shown before signing a conclusion: measures that point opposite ways, and a label that does not
 * fit them, rests on one source only or comes early (`ageYears`, whole years on the day it is given). Nothing here
 * decides; an empty list means that nothing of this kind was found.
 */
export function handContradictions(
  rows: readonly LateralLineRow[],
  preference: HandPreference | null,
  ageYears: number | null = null,
): string[] {
  const chosen = preferenceRows(rows)
  const found = contradictionsAmong(chosen)
  if (preference === null) return found
  const label = handOfLabel[preference]
  if (label) found.push(...contradictionsOfHand(rows, label.hand, label.settled))
  else if (preference === 'mixed_steady_by_task' || preference === 'unclear')
    for (const hand of ['left', 'right'] as const)
      if (chosen.filter(isSided).length >= 2 && chosen.filter(isSided).every((row) => row.side === hand))
        found.push(
          `Everything that was asked or seen points to the ${hand} hand (${namedRows(chosen)}), and the label does not.`,
        )
  const sources = new Set(chosen.filter(isSided).map((row) => row.track))
  if (sources.size === 0) found.push('The label rests on no scored questionnaire and no observed reaching.')
  if (sources.size === 1)
    found.push(`The label rests on one source only: ${namedRows(chosen.filter(isSided))}.`)
  const provisional = chosen.filter((row) => row.caution !== null)
  if (label?.settled && provisional.length > 0)
    found.push(
      `The label says settled, and part of its ground is thin: ${provisional
        .map((row) => `${rowName(row)}: ${row.caution}`)
        .join('; ')}.`,
    )
  return [...found, ...settledEarly(label?.settled === true, ageYears)]
}
