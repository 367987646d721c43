import { formatQuotient } from './laterality.ts'
import type { LateralDetails, LateralSide, MeasurePart } from './lateralLine.ts'
import { measureKindLabels, type ReachingDetails, type ReachingScore } from './measures.ts'
import { reachingCautions } from './reaching.ts'

const sideWords = { left: 'Left', right: 'Right' } as const

const placeWords = ['far left', 'left', 'near left', 'middle', 'near right', 'right', 'far right']

const outOf = (part: ReachingScore['crossing']) =>
  part === null ? 'None counted' : `${part.count} of ${part.of}`

function reachingRaw({ reaches }: ReachingDetails, score: ReachingScore): LateralDetails['raw'] {
  const used = score.preferred === null ? 'Hand used more' : `${sideWords[score.preferred]} hand`
  return [
    { label: `${used} to the far side`, value: outOf(score.crossing) },
    { label: `${used} on its own side`, value: outOf(score.nearSide) },
    { label: `${used} to the middle`, value: outOf(score.midline) },
    ...reaches.map(({ place, hand, swapped }, index) => ({
      label: `Reach ${index + 1}, place ${place} (${placeWords[place - 1]})`,
      value: hand === null ? 'Lost' : `${sideWords[hand]}${swapped ? ', changed hands on the way' : ''}`,
    })),
  ]
}

function reachingSide({ index, chance }: ReachingScore): LateralSide | null {
  if (index === null || chance === null) return null
  return index < chance.low ? 'left' : index > chance.high ? 'right' : 'middle'
}

function chanceRule({ left, right, chance, pTwoSided }: ReachingScore): string {
  const n = left + right
  if (chance === null || pTwoSided === null) return 'Nothing was counted, so no side is told.'
  const high = Math.round((n * (100 + chance.high)) / 200)
  return (
    `A side is told when one hand was used more often than chance would explain. Of ${n} reaches, ${n - high} to ` +
    `${high} with one hand are within chance (exact sign test, two-sided, 5 %). Here: ${left} left, ${right} right, ` +
    `p ${pTwoSided < 0.001 ? 'below .001' : pTwoSided.toFixed(3).replace(/^0/, '')}.`
  )
}

/** The row of observed reaching, with its chance band and every reach. */
export const reachingRow = (details: ReachingDetails, score: ReachingScore): MeasurePart => ({
  part: 'reaching',
  aspect: 'reaching',
  measure: measureKindLabels.reaching,
  value: score.index,
  side: reachingSide(score),
  interval: null,
  chance: score.chance,
  basis:
    `${score.left + score.right} of ${7 * details.cardsPerPlace} reaches counted` +
    (score.lost > 0 ? `, ${score.lost} lost` : ''),
  caution:
    score.left + score.right < 7 * details.cardsPerPlace && score.index !== null
      ? 'Fewer reaches than the method asks for'
      : null,
  cutOffs: null,
  opens: {
    formula:
      '100 × (R − L) ÷ (R + L), where R and L are the reaches with each hand. Lost reaches count for neither.',
    worked:
      score.index === null
        ? null
        : `100 × (${score.right} − ${score.left}) ÷ (${score.right} + ${score.left}) = ${formatQuotient(score.index)}`,
    raw: reachingRaw(details, score),
    sideRule: chanceRule(score),
    citation:
      'Reaching for cards at seven places after Bishop DVM, Ross VA, Daniels MS, Bright P. 1996. Br J Psychol ' +
      '87:269-285 (abstract read). Six cards a place: Carlier et al., conference abstract. The number of three cards a ' +
      'place and the layout are from memory.',
    cautions: [
      reachingCautions.young,
      reachingCautions.specific,
      reachingCautions.task,
      reachingCautions.noBands,
    ],
  },
})
