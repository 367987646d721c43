import { compareDays } from './days.ts'
import { formatQuotient } from './laterality.ts'
import type { LockedMeasure } from './measureRows.ts'
import {
  measureKindLabels,
  type MeasureDetails,
  type MeasureScore,
  type SideSummary,
  type SkillScore,
} from './measures.ts'
import type { MeasureComparison } from './occasions.ts'
import { reliabilitiesRead, reliableChangeCautions, type ReliableChangeNote } from './reliableChange.ts'
import { isTakenAlike, skillTrends } from './trends.ts'

const newestFirst = (a: LockedMeasure, b: LockedMeasure) =>
  compareDays(b.measuredOn, a.measuredOn) || (a.lockedAt < b.lockedAt ? 1 : -1)

const shown = (value: number | null, unit = '') =>
  value === null ? 'None' : `${value.toFixed(1).replace('-', '−')}${unit}`

const fraction = (part: { count: number; of: number } | null) =>
  part === null ? 'None' : `${part.count} of ${part.of}`

type Lines = { label: string; value: string }[]

const skillLines = ({ left, right, index, interval, unit }: SkillScore): Lines => {
  const sign = unit === 'seconds' ? ' s' : ''
  const hand = (of: SkillScore['left']) => `${shown(of.mean, sign)} over ${of.trials} trials`
  return [
    { label: 'Left hand, mean', value: hand(left) },
    { label: 'Right hand, mean', value: hand(right) },
    { label: 'Index', value: formatQuotient(index) },
    {
      label: '95 % interval of the index',
      value: interval ? `${formatQuotient(interval.low)} to ${formatQuotient(interval.high)}` : 'None',
    },
  ]
}

const sideLine = (label: string, { side, sum, answered }: SideSummary): Lines[number] => ({
  label,
  value: side === null ? 'Not done' : `${side}, sum ${String(sum).replace('-', '−')} of ${answered}`,
})

/** How the measure was taken, where that is a choice: figures of two ways of taking it are not alike. */
function takenLines(details: MeasureDetails): Lines {
  switch (details.kind) {
    case 'reaching':
      return [{ label: 'Cards a place', value: String(details.cardsPerPlace) }]
    case 'pegs':
      return [{ label: 'Pegs in one trial', value: String(details.pegs ?? 'None') }]
    case 'tapping':
    case 'dots':
      return [
        { label: 'Length of one trial', value: details.seconds === null ? 'None' : `${details.seconds} s` },
      ]
    case 'sides':
      return [
        {
          label: 'Far target at',
          value: details.eyeFarMetres === null ? 'Not noted' : `${details.eyeFarMetres} m`,
        },
      ]
    case 'seating':
      return []
  }
}

function linesOf(score: MeasureScore): Lines {
  switch (score.kind) {
    case 'reaching':
      return [
        { label: 'Left reaches', value: String(score.left) },
        { label: 'Right reaches', value: String(score.right) },
        { label: 'Lost', value: String(score.lost) },
        { label: 'Index', value: formatQuotient(score.index) },
        { label: 'Across to the far side', value: fraction(score.crossing) },
        { label: 'Own side', value: fraction(score.nearSide) },
        { label: 'Middle', value: fraction(score.midline) },
      ]
    case 'pegs':
    case 'tapping':
    case 'dots':
      return skillLines(score)
    case 'sides':
      return [
        sideLine('Foot', score.foot),
        sideLine('Eye, far', score.eyeFar),
        sideLine('Eye, near', score.eyeNear),
        sideLine('Ear', score.ear),
      ]
    case 'seating':
      return [
        { label: 'Seat to change by', value: shown(score.seatChange, ' cm') },
        { label: 'Depth to change by', value: shown(score.depthChange, ' cm') },
        { label: 'Desk to change by', value: shown(score.deskChange, ' cm') },
      ]
  }
}

/**
 * Reliable change asks for a retest coefficient and a standard deviation of the same task at the same age. Coefficients
 * were read for nine-hole pegs and for tapping, a standard deviation for children of one age for neither.
 */
function skillReliability(kind: 'pegs' | 'tapping' | 'dots'): ReliableChangeNote {
  const read = reliabilitiesRead
    .filter(({ measure }) =>
      (kind === 'pegs' ? /pegs/ : kind === 'tapping' ? /tapping/ : /dots/).test(measure),
    )
    .map(({ measure, coefficient, source }) => `${measure}: ${coefficient} (${source})`)
  return {
    used: false,
    why:
      'Reliable change is not worked out: it needs a standard deviation for children of one age on this very task, and ' +
      `none was found. ${read.length > 0 ? `Read so far: ${read.join('; ')}.` : 'No retest coefficient was found either.'}`,
    cautions: [...reliableChangeCautions],
  }
}

function reliabilityOf(kind: MeasureComparison['kind']): ReliableChangeNote | null {
  if (kind === 'pegs' || kind === 'tapping' || kind === 'dots') return skillReliability(kind)
  if (kind === 'reaching')
    return {
      used: false,
      why: 'Reliable change is not worked out for reaching: no retest coefficient for children was found.',
      cautions: [],
    }
  return null
}

const takenOtherwise =
  'The two occasions were not taken in the same way (see the last line), so the figures are not alike.'

function meansOf(earlier: LockedMeasure, later: LockedMeasure): MeasureComparison['means'] {
  const [before, after] = [earlier.score, later.score]
  if (!('unit' in before) || !('unit' in after) || !isTakenAlike(earlier.details, later.details)) return []
  return [
    { label: 'Left hand', before: before.left.mean, after: after.left.mean },
    { label: 'Right hand', before: before.right.mean, after: after.right.mean },
  ]
}

/** The two newest occasions of each kind of measure, figure by figure. Parts that were not done are left out. */
export function compareMeasureOccasions(measures: readonly LockedMeasure[]): MeasureComparison[] {
  const kinds = [...new Set(measures.map(({ details }) => details.kind))]
  const trends = skillTrends(measures)
  return kinds.flatMap((kind) => {
    const [after, before] = measures
      .filter(({ details, notDoneReason }) => details.kind === kind && notDoneReason === null)
      .toSorted(newestFirst)
    if (!after || !before) return []
    const was = [...linesOf(before.score), ...takenLines(before.details)]
    return [
      {
        kind,
        title: measureKindLabels[kind],
        before: { measureId: before.id, on: before.measuredOn },
        after: { measureId: after.id, on: after.measuredOn },
        lines: [...linesOf(after.score), ...takenLines(after.details)].map(({ label, value }, index) => ({
          label,
          before: was[index]?.value ?? 'None',
          after: value,
        })),
        caution: isTakenAlike(before.details, after.details) ? null : takenOtherwise,
        reliable: reliabilityOf(kind),
        means: meansOf(before, after),
        trends: trends.filter((trend) => trend.kind === kind),
      },
    ]
  })
}
