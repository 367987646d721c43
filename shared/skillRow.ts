import { neverAveraged, skillCautions, tooAlike } from './handSkill.ts'
import { formatQuotient } from './laterality.ts'
import type { LateralDetails, LateralSide, MeasurePart } from './lateralLine.ts'
import {
  measureKindLabels,
  type HandSummary,
  type SkillDetails,
  type SkillKind,
  type SkillScore,
} from './measures.ts'

/** '14.9': one decimal for display. */
const shown = (value: number) => value.toFixed(1)

const skillCitations: Record<SkillKind, string> = {
  pegs:
    'Timed moving of pegs after Annett, index as a share of the total after Schmidt et al. 2000, Neuropsychologia ' +
    '38:529-534 (abstracts read).',
  tapping:
    'Timed tapping; index as a share of the total after Schmidt et al. 2000, Neuropsychologia 38:529-534 (abstract ' +
    'read).',
  dots:
    'Dots in circles after Tapley & Bryden 1985, Neuropsychologia 23:215-221 (abstract read); index as a share of the ' +
    'total after Schmidt et al. 2000, Neuropsychologia 38:529-534.',
}

const everySkill = [
  'Preference and skill are different things: neither corrects the other.',
  neverAveraged,
  'No table by age is used here: the child is compared with the child only.',
]

function skillSide({ interval }: SkillScore): LateralSide | null {
  if (interval === null) return null
  return interval.high < 0 ? 'left' : interval.low > 0 ? 'right' : 'middle'
}

const unitOf = ({ unit }: SkillScore) => (unit === 'seconds' ? ' s' : '')

function skillWorked({ left, right, unit, index }: SkillScore): string | null {
  if (index === null || left.mean === null || right.mean === null) return null
  const [l, r] = [shown(left.mean), shown(right.mean)]
  return unit === 'seconds'
    ? `100 × (${l} − ${r}) ÷ (${l} + ${r}) = ${formatQuotient(index)}`
    : `100 × (${r} − ${l}) ÷ (${r} + ${l}) = ${formatQuotient(index)}`
}

function meanWords(hand: HandSummary, unit: string): string {
  if (hand.mean === null) return 'No trial'
  const spread = hand.sd === null ? '' : `, standard deviation ${shown(hand.sd)}`
  const interval =
    hand.interval === null
      ? ''
      : `, 95 % interval ${shown(hand.interval.low)} to ${shown(hand.interval.high)}${unit}`
  return `${shown(hand.mean)}${unit} over ${hand.trials} ${hand.trials === 1 ? 'trial' : 'trials'}${spread}${interval}`
}

function skillRaw({ trials }: SkillDetails, score: SkillScore): LateralDetails['raw'] {
  const unit = unitOf(score)
  return [
    { label: 'Left hand, mean', value: meanWords(score.left, unit) },
    { label: 'Right hand, mean', value: meanWords(score.right, unit) },
    ...trials.map(({ hand, value, interrupted }, index) => ({
      label: `Trial ${index + 1}, ${hand} hand`,
      value:
        (value === null ? 'Not taken' : `${value}${unit}`) +
        (interrupted ? ', interrupted and left out' : ''),
    })),
  ]
}

function noInterval(score: SkillScore): string | null {
  if (score.index === null || score.interval !== null) return null
  return tooAlike(score)
    ? 'The trials are too alike: no interval'
    : 'Fewer than two trials a hand: no interval'
}

/** The row of one task done with each hand, with the interval of its index and every trial. */
export const skillRow = (details: SkillDetails, score: SkillScore): MeasurePart => ({
  part: score.kind,
  aspect: 'skill',
  measure: measureKindLabels[score.kind],
  value: score.index,
  side: skillSide(score),
  interval: score.interval,
  chance: null,
  basis:
    `${score.left.trials} ${score.left.trials === 1 ? 'trial' : 'trials'} left, ${score.right.trials} right` +
    (score.interrupted > 0 ? `, ${score.interrupted} interrupted` : ''),
  caution: noInterval(score),
  cutOffs: null,
  opens: {
    formula:
      score.unit === 'seconds'
        ? '100 × (L − R) ÷ (L + R), where L and R are the mean seconds of each hand: left of zero when the left hand is quicker.'
        : '100 × (R − L) ÷ (R + L), where R and L are the mean counts of each hand: left of zero when the left hand does more.',
    worked: skillWorked(score),
    raw: skillRaw(details, score),
    sideRule:
      'A side is told when the approximate 95 % interval of the index keeps clear of zero. With fewer than two trials a ' +
      'hand, or when no trial differs, there is no interval and no side.',
    citation: skillCitations[score.kind],
    cautions: [...skillCautions(score), ...everySkill],
  },
})
