import { ageInYears, type Day } from './days.ts'
import { handStatements } from './handStatements.ts'
import { compareInformants, type InformantComparison } from './informants.ts'
import type { HandProfileRow, LateralLineRow } from './lateralLine.ts'
import { compareMeasureOccasions } from './measureOccasions.ts'
import { measureRows, type LockedMeasure } from './measureRows.ts'
import type { MeasureView } from './measures.ts'
import { compareFormOccasions, type FormComparison, type MeasureComparison } from './occasions.ts'
import { questionnaireRows, type LockedResponse } from './questionnaireRows.ts'
import type { QuestionnaireView } from './questionnaires.ts'
import type { HandStatement } from './sideStatements.ts'

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

/** A row without what it opens to, for places that only point to the full picture. */
export const withoutDetails = ({ opens: _opens, ...row }: HandProfileRow): LateralLineRow => row

/** Everything that is worked out from locked answers and measures; `birthDate` tells the age at the newest of them. */
export function handProfileOf(
  responses: readonly LockedResponse[],
  measures: readonly LockedMeasure[],
  birthDate: Day,
): Pick<HandProfileView, 'lateralLine' | 'statements' | 'informants' | 'occasions'> {
  const lateralLine = handProfileRows(responses, measures)
  const informants = compareInformants(responses)
  const newest = lateralLine
    .map(({ occasion }) => occasion)
    .toSorted()
    .at(-1)
  const ageOn = (day: Day | undefined) => (day === undefined ? null : ageInYears(birthDate, day))
  const ageYears = ageOn(newest)
  const ageYearsAtReaching = ageOn(
    lateralLine.find(({ aspect, latest }) => aspect === 'reaching' && latest)?.occasion,
  )
  return {
    lateralLine,
    statements: handStatements(lateralLine, { ageYears, ageYearsAtReaching, informants, measures }),
    informants,
    occasions: { forms: compareFormOccasions(responses), measures: compareMeasureOccasions(measures) },
  }
}
