import type { AlertView } from '../../shared/alerts.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { canActOnAlert } from '../policies/alerts.ts'
import type { AlertRecord } from '../queries/alerts.ts'

export const presentAlert = (alert: AlertRecord, access: ChildAccess): AlertView => ({
  id: alert.id,
  flag: alert.flag,
  text: alert.text,
  level: alert.level,
  urgency: alert.urgency,
  advice: alert.advice,
  holdsBooking: alert.holdsBooking,
  origin: alert.origin,
  originId: alert.originId,
  raisedAt: alert.raisedAt.toISOString(),
  raisedBy: alert.raisedBy,
  actedAt: alert.actedAt?.toISOString() ?? null,
  actedBy: alert.actedBy,
  action: alert.action,
  can: { act: canActOnAlert(access, alert) },
})
