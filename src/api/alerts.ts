import { http } from '@/api/http.ts'
import type { AlertAction, AlertRaised, AlertView } from '@shared/alerts.ts'

const path = (childId: string) => `/children/${childId}/alerts`

export const alertsApi = {
  /** All of them, newest first, with what was done. */
  forChild: (childId: string) => http.get<AlertView[]>(path(childId)),
  raise: (childId: string, raised: AlertRaised, idempotencyKey: string) =>
    http.post<AlertView>(path(childId), raised, { idempotencyKey }),
  act: (childId: string, alertId: string, action: AlertAction) =>
    http.post<void>(`${path(childId)}/${alertId}/action`, action),
}
