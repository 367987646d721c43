import type { InformantComparison, InformantPair } from './informants.ts'
import type { LateralLineRow, LateralSide } from './lateralLine.ts'
import { informantLabels } from './questionnaires.ts'
import { crossingExpectedFrom, reachingCautions } from './reaching.ts'
import type { Hand } from './roles.ts'
import { idsOf, namedRows, sideStatements, skillStatements, type HandStatement } from './sideStatements.ts'

type Sided = LateralLineRow & { side: LateralSide }

const isSided = (row: LateralLineRow): row is Sided => row.side !== null
const pointsTo = (rows: readonly LateralLineRow[], hand: Hand) => rows.filter((row) => row.side === hand)

/** Newest rows that say which hand is chosen: what people answered and what reaching showed. */
export const preferenceRows = (rows: readonly LateralLineRow[]): LateralLineRow[] =>
  rows.filter((row) => row.latest && (row.aspect === 'preference' || row.aspect === 'reaching'))

const askedAndReached = (rows: readonly LateralLineRow[]) => {
  const chosen = preferenceRows(rows).filter(isSided)
  return {
    asked: chosen.filter((row) => row.aspect === 'preference'),
    reached: chosen.find((row) => row.aspect === 'reaching') ?? null,
  }
}

/** The one hand that rows point to, none of them to the other; null when they point both ways or to neither. */
function oneHand(rows: readonly LateralLineRow[]): Hand | null {
  const [left, right] = [pointsTo(rows, 'left').length > 0, pointsTo(rows, 'right').length > 0]
  return left === right ? null : left ? 'left' : 'right'
}

/** The hand that what was asked and seen points to; null where they point both ways, to neither, or say nothing yet. */
export const chosenHand = (rows: readonly LateralLineRow[]): Hand | null => oneHand(preferenceRows(rows))

function askedStatement(asked: readonly Sided[]): HandStatement | null {
  const [first] = asked
  if (!first)
    return { kind: 'open', text: 'No questionnaire has been scored yet.', because: null, rowIds: [] }
  if (asked.length < 2) return null
  const rowIds = idsOf(asked)
  if (asked.every((row) => row.side === first.side))
    return {
      kind: 'agrees',
      text:
        first.side === 'middle'
          ? `All ${asked.length} questionnaires lie between the cut-offs.`
          : `All ${asked.length} questionnaires point to the ${first.side} hand.`,
      because: null,
      rowIds,
    }
  const groups = [
    { words: 'To the left', rows: pointsTo(asked, 'left') },
    { words: 'To the right', rows: pointsTo(asked, 'right') },
    { words: 'Between the cut-offs', rows: asked.filter((row) => row.side === 'middle') },
  ].filter(({ rows }) => rows.length > 0)
  return {
    kind: 'differs',
    text: `The questionnaires do not all say the same. ${groups.map(({ words, rows }) => `${words}: ${namedRows(rows)}.`).join(' ')}`,
    because:
      'People see a child at different jobs and in different places, and forms ask about different activities. Compare ' +
      'the activities one by one before weighing them.',
    rowIds,
  }
}

const youngReaching = reachingCautions.young
const practised =
  'Questions are about practised jobs, reaching is a choice made on the spot, so they can part. See which activities and ' +
  'places differ, and ask whether anyone has pressed for one hand.'

function reachedStatement(asked: readonly Sided[], reached: Sided | null, young: boolean): HandStatement {
  if (!reached)
    return {
      kind: 'open',
      text: 'Reaching across the midline was not recorded yet.',
      because: null,
      rowIds: [],
    }
  const hand = oneHand(asked)
  const rowIds = idsOf(hand === null ? [reached] : [...pointsTo(asked, hand), reached])
  if (reached.side === 'middle')
    return {
      kind: hand === null ? 'open' : 'differs',
      text: `Reaching points to neither hand beyond chance (${namedRows([reached])}).`,
      because: young ? youngReaching : reachingCautions.specific,
      rowIds,
    }
  if (hand === null)
    return {
      kind: 'open',
      text: `Reaching points to the ${reached.side} hand, and what was answered does not point to one hand.`,
      because: practised,
      rowIds,
    }
  if (reached.side === hand)
    return {
      kind: 'agrees',
      text: `What was answered and what reaching showed point to the same hand, the ${hand}.`,
      because: null,
      rowIds,
    }
  return {
    kind: 'differs',
    text: `What was answered points to the ${hand} hand and reaching to the ${reached.side} (${namedRows([reached])}).`,
    because: young ? `${practised} ${youngReaching}` : practised,
    rowIds,
  }
}

const per = (share: number | null) => (share === null ? 'none' : `${Math.round(100 * share)} %`)
const kappaWords = ({ kappa, kappaInterval }: InformantPair) => {
  if (kappa === null) return ''
  const shown = (value: number) => value.toFixed(2).replace('-', '−')
  const interval = kappaInterval
    ? `, 95 % interval ${shown(kappaInterval.low)} to ${shown(kappaInterval.high)}`
    : ''
  return `, kappa ${shown(kappa)}${interval}`
}

function informantStatement(title: string, pair: InformantPair): HandStatement | null {
  if (pair.compared === 0) return null
  const who = `${informantLabels[pair.one]} and ${informantLabels[pair.other].toLowerCase()}`
  const figures = `agreement ${per(pair.share)}${kappaWords(pair)}`
  return pair.discrepancies === 0
    ? {
        kind: 'agrees',
        text: `${who} name the same side for all ${pair.compared} activities that both answered (${title}).`,
        because: null,
        rowIds: [],
      }
    : {
        kind: pair.pointedOut ? 'differs' : 'agrees',
        text: `${who} name different sides for ${pair.discrepancies} of ${pair.compared} activities (${title}; ${figures}).`,
        because: pair.pointedOut
          ? 'A child may do things differently at home and at school. Ask about those activities, or watch them.'
          : null,
        rowIds: [],
      }
}

export interface StatementFacts {
  /** Whole years at the newest occasion, corrected where the clinic corrects; null when nothing was recorded yet. */
  ageYears: number | null
  informants: readonly InformantComparison[]
}

const kinds: HandStatement['kind'][] = ['agrees', 'differs', 'open']

/**
 * In plain words: what agrees, what disagrees and why that may be ordinary, and what cannot be told yet. Descriptions of
 * what was recorded, never a diagnosis; the therapist concludes.
 */
export function handStatements(rows: readonly LateralLineRow[], facts: StatementFacts): HandStatement[] {
  if (rows.length === 0) return []
  const { asked, reached } = askedAndReached(rows)
  const young = facts.ageYears !== null && facts.ageYears < crossingExpectedFrom
  const hand = chosenHand(rows)
  const statements = [
    askedStatement(asked),
    reachedStatement(asked, reached, young),
    ...facts.informants.flatMap(({ title, pairs }) => pairs.map((pair) => informantStatement(title, pair))),
    ...skillStatements(hand, rows),
    ...sideStatements(hand, rows),
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
