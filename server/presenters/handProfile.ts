import { consentNeededTexts } from '../../shared/consentNeeded.ts'
import type { Day } from '../../shared/days.ts'
import { handProfileOf, type HandProfileView } from '../../shared/handProfile.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { canAddQuestionnaire } from '../policies/questionnaires.ts'
import type { HandEvidence } from '../queries/handEvidence.ts'
import type { MeasureRecord } from '../queries/measures.ts'
import type { QuestionnaireRecord } from '../queries/questionnaires.ts'
import { presentMeasure } from './measures.ts'
import { presentQuestionnaire } from './questionnaires.ts'

export interface HandProfileRecords {
  questionnaires: readonly QuestionnaireRecord[]
  measures: readonly MeasureRecord[]
  /** What of them is locked and not replaced. */
  evidence: HandEvidence
  birthDate: Day
  /** Is the consent to assess in force? */
  consented: boolean
}

export const presentHandProfile = (records: HandProfileRecords, access: ChildAccess): HandProfileView => {
  const { questionnaires, measures, evidence, birthDate, consented } = records
  return {
    ...handProfileOf(evidence.responses, evidence.measures, birthDate),
    questionnaires: questionnaires.map((response) => presentQuestionnaire(response, access)),
    measures: measures.map((measure) => presentMeasure(measure, access)),
    blocked: consented ? null : consentNeededTexts.assessment_treatment,
    can: { add: canAddQuestionnaire(access, consented) },
  }
}
