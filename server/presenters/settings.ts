import type { ClinicSettings, ClinicSettingsView } from '../../shared/settings.ts'
import type { Viewer } from '../access/actor.ts'
import { canChangeSettings } from '../policies/settings.ts'

export const presentSettings = (
  { settings, version }: { settings: ClinicSettings; version: number },
  viewer: Viewer,
): ClinicSettingsView => ({
  clinicName: settings.clinicName,
  clinicAddress: settings.clinicAddress,
  clinicPhone: settings.clinicPhone,
  timeZone: settings.timeZone,
  waitTargetWeeks: settings.waitTargetWeeks,
  reviewWeeks: settings.reviewWeeks,
  letterTargetWorkingDays: settings.letterTargetWorkingDays,
  untriagedWorkingDays: settings.untriagedWorkingDays,
  unsignedSoonHours: settings.unsignedSoonHours,
  unsignedOverdueHours: settings.unsignedOverdueHours,
  correctedUntilMonths: settings.correctedUntilMonths,
  cutOffSet: settings.cutOffSet,
  emergencyText: settings.emergencyText,
  version,
  can: { change: canChangeSettings(viewer) },
})
