import { compareDays, type Day } from './days.ts'
import { handUseStandingLabels, type HandUseScore } from './handUse.ts'
import type { LateralLineRow } from './lateralLine.ts'
import { informantLabels, type Informant } from './questionnaires.ts'

/** A locked hand-use response that no later one replaces. */
export interface LockedHandUse {
  id: string
  answeredOn: Day
  informant: Informant
  score: HandUseScore
  /** ISO moment; tells two responses of one day apart. */
  lockedAt: string
}

/** Rows of the lateral line for the hand-use questionnaire, newest first. Only the newest is `latest`. */
export function handUseRows(responses: readonly LockedHandUse[]): LateralLineRow[] {
  const newestFirst = responses.toSorted(
    (a, b) => compareDays(b.answeredOn, a.answeredOn) || (a.lockedAt < b.lockedAt ? 1 : -1),
  )
  return newestFirst.map(({ id, answeredOn, informant, score }, index) => ({
    id,
    measure: 'Hand-use questionnaire',
    occasion: answeredOn,
    value: score.quotient,
    interval: null,
    basis: `${score.answered} of ${score.answered + score.doesNotDo + score.unanswered} activities answered`,
    caution: score.standing === 'scorable' ? null : handUseStandingLabels[score.standing],
    cutOffs: {
      name: score.cutOffs.label,
      left: score.cutOffs.left,
      right: score.cutOffs.right,
      inclusive: score.cutOffs.inclusive,
    },
    informant: informantLabels[informant],
    latest: index === 0,
  }))
}
