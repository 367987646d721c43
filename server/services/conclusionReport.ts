import { dayOf, type Day } from '../../shared/days.ts'
import { AppError, conflict } from '../errors.ts'
import { renderAssessmentReport } from '../pdf/assessmentReport.ts'
import { UnprintableTextError } from '../pdf/letterFonts.ts'
import { hasReport } from '../policies/conclusions.ts'
import type { ConclusionRecord } from '../queries/conclusions.ts'
import { printInTurn } from './printInTurn.ts'

/** The report of a signed conclusion, drawn from what was kept at the signature. 409 `not_signed` before. */
export const printReport = async (conclusion: ConclusionRecord): Promise<{ pdf: Buffer; day: Day }> => {
  const { content, evidence, signedAt, countersignedAt, countersignedBy } = conclusion
  if (!hasReport(conclusion) || evidence === null || signedAt === null)
    throw conflict('not_signed', 'The report is printed once the conclusion is signed.')
  const countersigned =
    countersignedAt !== null && countersignedBy !== null
      ? { by: countersignedBy, at: countersignedAt.toISOString() }
      : null
  const report = { content, evidence, signedAt: signedAt.toISOString(), countersigned }
  const pdf = await printInTurn(() => renderAssessmentReport(report)).catch((error: unknown) => {
    if (error instanceof UnprintableTextError) throw new AppError(422, 'unprintable', error.message)
    throw error
  })
  return { pdf, day: dayOf(signedAt, evidence.head.clinic.timeZone) }
}
