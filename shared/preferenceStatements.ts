import type { LateralLineRow, LateralSide } from './lateralLine.ts'
import { reachingCautions } from './reaching.ts'
import type { Hand } from './roles.ts'
import { idsOf, namedRows, type HandStatement } from './sideStatements.ts'

export type Sided = LateralLineRow & { side: LateralSide }

export const isSided = (row: LateralLineRow): row is Sided => row.side !== null
export const pointsTo = (rows: readonly LateralLineRow[], hand: Hand) =>
  rows.filter((row) => row.side === hand)

/** Newest rows that say which hand is chosen: what people answered and what reaching showed. */
export const preferenceRows = (rows: readonly LateralLineRow[]): LateralLineRow[] =>
  rows.filter((row) => row.latest && (row.aspect === 'preference' || row.aspect === 'reaching'))

/** The newest scored questionnaires, and the newest reaching. */
export const askedAndReached = (rows: readonly LateralLineRow[]) => {
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

/** Whether several questionnaires say the same; null for one alone. */
export function askedStatement(asked: readonly Sided[]): HandStatement | null {
  const [first] = asked
  if (!first)
    return { kind: 'open', text: 'No questionnaire has been scored yet.', because: null, rowIds: [] }
  if (asked.length < 2) return null
  const rowIds = idsOf(asked)
  const all = asked.length === 2 ? 'Both' : `All ${asked.length}`
  if (asked.every((row) => row.side === first.side))
    return {
      kind: 'agrees',
      text:
        first.side === 'middle'
          ? `${all} questionnaires lie between the cut-offs.`
          : `${all} questionnaires point to the ${first.side} hand.`,
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

/** What reaching shows beside what was answered. */
export function reachedStatement(
  asked: readonly Sided[],
  reached: Sided | null,
  young: boolean,
): HandStatement {
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
