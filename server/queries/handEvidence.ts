import type { LockedMeasure } from '../../shared/measureRows.ts'
import type { LockedResponse } from '../../shared/questionnaireRows.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { listMeasures } from './measures.ts'
import { listQuestionnaires } from './questionnaires.ts'

/** Questionnaires and measures of a child that are locked and not replaced: what the lateral line is drawn from. */
export const listLockedHandEvidence = async (
  access: ChildAccess,
): Promise<{ responses: LockedResponse[]; measures: LockedMeasure[] }> => {
  const [questionnaires, measures] = await Promise.all([listQuestionnaires(access), listMeasures(access)])
  return {
    responses: questionnaires.flatMap(({ lockedAt, superseded, form, ...response }) =>
      lockedAt === null || superseded
        ? []
        : [
            {
              ...response,
              form: { ...form, retiredAt: form.retiredAt?.toISOString() ?? null },
              lockedAt: lockedAt.toISOString(),
            },
          ],
    ),
    measures: measures.flatMap(({ lockedAt, superseded, ...measure }) =>
      lockedAt === null || superseded ? [] : [{ ...measure, lockedAt: lockedAt.toISOString() }],
    ),
  }
}
