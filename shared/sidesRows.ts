import { formatQuotient } from './laterality.ts'
import type { LateralAspect, LateralDetails, MeasurePart } from './lateralLine.ts'
import type { EyeAction, SideSummary, SidesDetails, SidesScore, Tries } from './measures.ts'
import { crossedCaution, earActionLabels, expectedRates, footActionLabels } from './sides.ts'

const sideWords = { left: 'Left', right: 'Right', mixed: 'Either' } as const

const triesWords = (tries: Tries) =>
  tries.map((side) => (side === null ? 'not done' : sideWords[side].toLowerCase())).join(', ')

const sidesSource = 'Foot, eye and ear by actions shown, after Coren and Porac & Coren (from memory).'

/** Three tries are asked for: fewer may agree by luck. Actions without any try were not done. */
function fewTries(actions: readonly Tries[]): string | null {
  const short = actions.some((tries) => tries.includes(null) && tries.some((side) => side !== null))
  return short ? 'Fewer than three tries of an action' : null
}

function sidesRow(
  part: string,
  aspect: LateralAspect,
  measure: string,
  summary: SideSummary,
  { raw, tries }: { raw: LateralDetails['raw']; tries: readonly Tries[] },
  cautions: string[],
): MeasurePart | null {
  if (summary.answered === 0) return null
  return {
    part,
    aspect,
    measure,
    value: summary.index,
    side: summary.side === 'mixed' ? 'middle' : summary.side,
    interval: null,
    chance: null,
    basis: `${summary.answered} ${summary.answered === 1 ? 'action' : 'actions'} shown`,
    caution: fewTries(tries),
    cutOffs: null,
    opens: {
      formula: '100 × sum ÷ actions, where each action gives +1 for right, −1 for left and 0 for mixed.',
      worked:
        summary.index === null
          ? null
          : `100 × ${String(summary.sum).replace('-', '−')} ÷ ${summary.answered} = ${formatQuotient(summary.index)}`,
      raw,
      sideRule: 'Three tries of an action that do not all agree are mixed; the side is that of the sum.',
      citation: sidesSource,
      cautions: [...cautions, crossedCaution],
    },
  }
}

const shownBy = <Action extends string>(tries: Record<Action, Tries>, words: Record<Action, string>) => {
  const actions = Object.keys(words) as Action[]
  return {
    raw: actions.map((action) => ({ label: words[action], value: triesWords(tries[action]) })),
    tries: actions.map((action) => tries[action]),
  }
}

/** Rows of foot, eye far, eye near and ear; none for a part without an action shown. */
export function sidesRows(details: SidesDetails, score: SidesScore): MeasurePart[] {
  const metres = details.eyeFarMetres === null ? '' : `, target at ${details.eyeFarMetres} m`
  const eye = (action: EyeAction, label: string) => ({
    raw: [{ label, value: triesWords(details.eye[action]) }],
    tries: [details.eye[action]],
  })
  return [
    sidesRow('foot', 'foot', 'Foot', score.foot, shownBy(details.foot, footActionLabels), [
      expectedRates.foot,
    ]),
    sidesRow('eyeFar', 'eye_far', 'Eye, far', score.eyeFar, eye('far', `Sights far away${metres}`), [
      expectedRates.eye,
      expectedRates.eyeDistance,
    ]),
    sidesRow('eyeNear', 'eye_near', 'Eye, near', score.eyeNear, eye('near', 'Sights close by'), [
      expectedRates.eye,
      expectedRates.eyeDistance,
    ]),
    sidesRow('ear', 'ear', 'Ear', score.ear, shownBy(details.ear, earActionLabels), []),
  ].filter((row) => row !== null)
}
