import { http } from '@/api/http.ts'
import type { WritingObservationDetails, WritingObservationView } from '@shared/writingObservations.ts'

const path = (childId: string) => `/children/${childId}/writing-observations`

export const writingObservationsApi = {
  forChild: (childId: string) => http.get<WritingObservationView[]>(path(childId)),
  add: (childId: string, details: WritingObservationDetails, idempotencyKey: string) =>
    http.post<WritingObservationView>(path(childId), details, { idempotencyKey }),
}
