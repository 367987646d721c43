import { http } from '@/api/http.ts'
import type { GuardianDetails, GuardianView } from '@shared/guardians.ts'

const path = (childId: string) => `/children/${childId}/guardians`

export const guardiansApi = {
  forChild: (childId: string) => http.get<GuardianView[]>(path(childId)),
  add: (childId: string, details: GuardianDetails, idempotencyKey: string) =>
    http.post<GuardianView>(path(childId), details, { idempotencyKey }),
  change: (childId: string, id: string, details: GuardianDetails, version: number) =>
    http.put<GuardianView>(`${path(childId)}/${id}`, details, { ifMatch: version }),
  invite: (childId: string, id: string) => http.post<void>(`${path(childId)}/${id}/invite`),
  restrict: (childId: string, id: string, restriction: { restricted: boolean; reason: string }) =>
    http.post<void>(`${path(childId)}/${id}/restrict`, restriction),
}
