import type { MeasureView } from '../../shared/measures.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { canChangeMeasure, canReplaceMeasure } from '../policies/measures.ts'
import type { MeasureRecord } from '../queries/measures.ts'

export const presentMeasure = (measure: MeasureRecord, access: ChildAccess): MeasureView => ({
  id: measure.id,
  childId: measure.childId,
  kind: measure.kind,
  methodVersion: measure.methodVersion,
  measuredOn: measure.measuredOn,
  details: measure.details,
  score: measure.score,
  notDoneReason: measure.notDoneReason,
  comment: measure.comment,
  startedBy: measure.startedBy,
  lockedAt: measure.lockedAt?.toISOString() ?? null,
  lockedBy: measure.lockedBy,
  replacesId: measure.replacesId,
  replacedById: measure.replacedById,
  version: measure.version,
  can: {
    change: canChangeMeasure(access, measure),
    lock: canChangeMeasure(access, measure),
    replace: canReplaceMeasure(access, measure),
  },
})
