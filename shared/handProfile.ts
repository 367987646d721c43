import { compareDays, type Day } from './days.ts'
import type { FormScore } from './forms.ts'
import { handUseStandingLabels } from './handUse.ts'
import type { HandStatement } from './sideStatements.ts'
import type { InformantComparison } from './informants.ts'
import type { HandProfileRow, LateralLineRow } from './lateralLine.ts'
import { measureRows, type LockedMeasure } from './measureRows.ts'
import type { MeasureView } from './measures.ts'
import type { FormComparison, MeasureComparison } from './occasions.ts'
import { questionnaireRows, type LockedResponse } from './questionnaireRows.ts'
import { informantLabels, type Informant, type QuestionnaireView } from './questionnaires.ts'

export interface HandProfileView {
  /** Preference first, then reaching, skill, foot, eye and ear; newest first within a track. */
  lateralLine: HandProfileRow[]
  statements: HandStatement[]
  /** Forms answered by at least two kinds of informant, side by side. */
  informants: InformantComparison[]
  /** Each form and each measure of the two newest occasions, item by item. */
  occasions: { forms: FormComparison[]; measures: MeasureComparison[] }
  questionnaires: QuestionnaireView[]
  measures: MeasureView[]
  /** Why nothing can be added now, in words; null when it can. */
  blocked: string | null
  can: { add: boolean }
}

/** Every row of the lateral line: what was answered first, then what was seen, then skill, foot, eye and ear. */
export const handProfileRows = (
  responses: readonly LockedResponse[],
  measures: readonly LockedMeasure[],
): HandProfileRow[] => {
  const measured = measureRows(measures)
  const of = (...aspects: HandProfileRow['aspect'][]) =>
    measured.filter((row) => aspects.includes(row.aspect))
  return [
    ...questionnaireRows(responses),
    ...of('reaching'),
    ...of('skill'),
    ...of('foot', 'eye_far', 'eye_near', 'ear'),
  ]
}

/** A locked hand-use response that no later one replaces. */
export interface LockedHandUse {
  id: string
  answeredOn: Day
  informant: Informant
  score: Pick<
    FormScore,
    'quotient' | 'answered' | 'doesNotDo' | 'unanswered' | 'standing' | 'direction' | 'cutOffs'
  >
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
    aspect: 'preference' as const,
    track: `hand-use-10|${informant}`,
    measure: 'Hand-use questionnaire',
    occasion: answeredOn,
    value: score.quotient,
    side: score.direction === 'mixed' ? ('middle' as const) : score.direction,
    interval: null,
    chance: null,
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
    source: { kind: 'questionnaire' as const, id },
  }))
}
