import type { ClinicSettings, ClinicSettingsView } from '@shared/settings.ts'
import { http } from '@/api/http.ts'

export const settingsApi = {
  get: () => http.get<ClinicSettingsView>('/settings'),
  update: (settings: ClinicSettings, version: number) =>
    http.put<ClinicSettingsView>('/settings', settings, { ifMatch: version }),
}
