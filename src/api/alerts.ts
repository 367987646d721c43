import { http } from '@/api/http.ts'
import type { AlertAction, AlertPage, AlertRaised, AlertView } from '@shared/alerts.ts'

const path = (childId: string) => `/children/${childId}/alerts`

export const alertsApi = {
  forChild: (childId: string, page = 1) => http.get<AlertPage>(path(childId), { query: { page } }),
  raise: (childId: string, raised: AlertRaised, idempotencyKey: string) =>
    http.post<AlertView>(path(childId), raised, { idempotencyKey }),
  act: (childId: string, alertId: string, action: AlertAction) =>
    http.post<void>(`${path(childId)}/${alertId}/action`, action),
}
