import type { HandPreference } from './conclusions.ts'
import { preferenceRows } from './handStatements.ts'
import { rowName, type LateralLineRow } from './lateralLine.ts'
import type { Hand } from './roles.ts'
import { namedRows, otherHand } from './sideStatements.ts'

const isSided = (row: LateralLineRow) => row.side !== null
const pointsTo = (rows: readonly LateralLineRow[], hand: Hand) => rows.filter((row) => row.side === hand)

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

/**
 * What a therapist is shown before signing a conclusion: measures that point opposite ways, and a label that does not
 * fit them or rests on one source only. Nothing here decides; an empty list means that nothing of this kind was found.
 */
export function handContradictions(
  rows: readonly LateralLineRow[],
  preference: HandPreference | null,
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
  return found
}
