import type { HistoryView } from '../../shared/histories.ts'
import { missingAnswers } from '../../shared/historyAnswers.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { canChangeHistory, canDiscardHistory, canReplaceHistory } from '../policies/histories.ts'
import type { HistoryRecord } from '../queries/histories.ts'

export const presentHistory = (
  history: HistoryRecord,
  access: ChildAccess,
  correctedUntilMonths: number,
): HistoryView => ({
  id: history.id,
  childId: history.childId,
  informant: history.informant,
  respondentName: history.respondentName,
  answeredOn: history.answeredOn,
  details: history.details,
  missing: missingAnswers(history.details),
  correctedUntilMonths,
  lockedAt: history.lockedAt?.toISOString() ?? null,
  lockedBy: history.lockedBy,
  replacesId: history.replacesId,
  replacedById: history.replacedById,
  leftOver: history.leftOver,
  version: history.version,
  can: {
    change: canChangeHistory(access, history),
    lock: canChangeHistory(access, history),
    discard: canDiscardHistory(access, history),
    replace: canReplaceHistory(access, history),
  },
})
