import { formatDay } from './days.ts'
import { neverAveraged } from './handSkill.ts'
import { formatQuotient } from './laterality.ts'
import { rowName, type LateralLineRow } from './lateralLine.ts'
import type { Hand } from './roles.ts'
import { areCrossed, crossedCaution, expectedRates } from './sides.ts'

export interface HandStatement {
  /** `open` is what cannot be told yet. */
  kind: 'agrees' | 'differs' | 'open'
  text: string
  /** Why that may be ordinary, or what to look at next; null when nothing needs saying. */
  because: string | null
  rowIds: string[]
}

export const idsOf = (rows: readonly LateralLineRow[]): string[] => rows.map(({ id }) => id)

/** 'Moving pegs of 3 Mar 2026: −7.1; Tapping of 3 Mar 2026: −4.0'. */
export const namedRows = (rows: readonly LateralLineRow[]): string =>
  rows.map((row) => `${rowName(row)} of ${formatDay(row.occasion)}: ${formatQuotient(row.value)}`).join('; ')

export const otherHand = (hand: Hand): Hand => (hand === 'left' ? 'right' : 'left')

const skillIsAnother =
  'Preference and skill are different things, and neither corrects the other. Where the other hand does clearly better, ' +
  'ask whether anyone has pressed for one hand, and about pain or an old injury.'

function skillAgainst(hand: Hand, skills: readonly LateralLineRow[]): HandStatement[] {
  const better = skills.filter((row) => row.side === hand)
  const worse = skills.filter((row) => row.side === otherHand(hand))
  const statements: HandStatement[] = []
  if (better.length > 0)
    statements.push({
      kind: 'agrees',
      text: `The ${hand} hand, which is chosen, also does better at ${namedRows(better)}.`,
      because: better.length > 1 ? neverAveraged : null,
      rowIds: idsOf(better),
    })
  if (worse.length > 0)
    statements.push({
      kind: 'differs',
      text: `The ${hand} hand is chosen, and the ${otherHand(hand)} hand does better at ${namedRows(worse)}.`,
      because: skillIsAnother,
      rowIds: idsOf(worse),
    })
  return statements
}

/** What each hand can do, beside which hand is chosen. */
export function skillStatements(hand: Hand | null, rows: readonly LateralLineRow[]): HandStatement[] {
  const skills = rows.filter((row) => row.latest && row.aspect === 'skill' && row.value !== null)
  const [lefts, rights] = [
    skills.filter((row) => row.side === 'left'),
    skills.filter((row) => row.side === 'right'),
  ]
  const statements = hand === null ? [] : skillAgainst(hand, skills)
  if (lefts.length > 0 && rights.length > 0)
    statements.push({
      kind: 'differs',
      text: `The left hand does better at ${namedRows(lefts)}, the right hand at ${namedRows(rights)}.`,
      because: `Each task asks for another skill. ${neverAveraged}`,
      rowIds: idsOf([...lefts, ...rights]),
    })
  const level = skills.filter((row) => row.side === 'middle')
  if (level.length > 0)
    statements.push({
      kind: 'open',
      text: `No clear difference between the hands at ${namedRows(level)}.`,
      because: 'The interval reaches both sides of zero: more trials may tell, or the hands are about alike.',
      rowIds: idsOf(level),
    })
  const few = skills.filter((row) => row.side === null)
  if (few.length > 0)
    statements.push({
      kind: 'open',
      text: `Too few trials, or trials too alike, to tell the hands apart at ${namedRows(few)}.`,
      because: null,
      rowIds: idsOf(few),
    })
  return statements
}

const parts = [
  { aspect: 'foot', name: 'foot', rates: expectedRates.foot },
  { aspect: 'eye_far', name: 'eye for far things', rates: expectedRates.eye },
  { aspect: 'eye_near', name: 'eye for near things', rates: expectedRates.eye },
  { aspect: 'ear', name: 'ear', rates: null },
] as const

function partStatement(
  hand: Hand,
  row: LateralLineRow,
  { name, rates }: (typeof parts)[number],
): HandStatement | null {
  const rowIds = [row.id]
  if (row.side === hand)
    return {
      kind: 'agrees',
      text: `Hand and ${name} are on the same side, the ${hand}.`,
      because: null,
      rowIds,
    }
  if (row.side === otherHand(hand))
    return {
      kind: 'differs',
      text: `The child chooses the ${hand} hand and the ${otherHand(hand)} ${name}.`,
      because: rates === null ? crossedCaution : `${rates} ${crossedCaution}`,
      rowIds,
    }
  if (row.side === 'middle')
    return {
      kind: 'open',
      text: `No one side is used throughout for the ${name}.`,
      because: crossedCaution,
      rowIds,
    }
  return null
}

/** Leaves a caution with the first statement that carries it: read three times over, it is not read at all. */
export function once(caution: string, statements: readonly HandStatement[]): HandStatement[] {
  const first = statements.findIndex(({ because }) => because?.includes(caution))
  return statements.map((statement, index) => {
    if (index === first || !statement.because?.includes(caution)) return statement
    const rest = statement.because.replace(caution, '').trim()
    return { ...statement, because: rest === '' ? null : rest }
  })
}

/** Foot, eyes and ear beside the hand; a different side is ordinary and is said to be. */
export function sideStatements(hand: Hand | null, rows: readonly LateralLineRow[]): HandStatement[] {
  const found = parts.flatMap((part) => {
    const row = rows.find(({ latest, aspect }) => latest && aspect === part.aspect)
    return row ? [{ part, row }] : []
  })
  const statements = once(
    crossedCaution,
    hand === null ? [] : found.flatMap(({ part, row }) => partStatement(hand, row, part) ?? []),
  )
  const far = found.find(({ part }) => part.aspect === 'eye_far')?.row
  const near = found.find(({ part }) => part.aspect === 'eye_near')?.row
  const sighting = (row: LateralLineRow | undefined) =>
    row?.side === 'middle' ? 'mixed' : (row?.side ?? null)
  if (far && near && areCrossed(sighting(far), sighting(near)) === true)
    statements.push({
      kind: 'differs',
      text: `Another eye is used for near than for far things (far ${formatQuotient(far.value)}, near ${formatQuotient(near.value)}).`,
      because: expectedRates.eyeDistance,
      rowIds: idsOf([far, near]),
    })
  return statements
}
