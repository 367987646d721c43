import type { ClinicSettings } from '../../shared/settings.ts'
import type { Actor } from '../access/actor.ts'
import { dayOf, type Day } from '../../shared/days.ts'
import { now } from '../clock.ts'
import { database, type Tx } from '../dataSource.ts'
import { ClinicSetting } from '../entities/ClinicSetting.ts'
import { transact } from './transact.ts'
import { StaleWrite } from './versions.ts'

/** What a new installation starts with; the clinic changes every value under Settings. */
export const firstSettings: ClinicSettings = {
  clinicName: 'Our clinic',
  clinicAddress: 'Address not entered yet',
  clinicPhone: 'Phone not entered yet',
  timeZone: 'Europe/London',
  waitTargetWeeks: 18,
  reviewWeeks: 12,
  letterTargetWorkingDays: 10,
  untriagedWorkingDays: 10,
  unsignedSoonHours: 24,
  unsignedOverdueHours: 48,
  correctedUntilMonths: 24,
  cutOffSet: 'clinic-40',
  emergencyText:
    'If a child is suddenly unwell or weak on one side, call the emergency number of your country at once.',
}

export const readSettingsRow = async (tx?: Tx): Promise<{ settings: ClinicSettings; version: number }> => {
  const row = await (tx ?? database().manager).findOneBy(ClinicSetting, { id: 1 })
  return row
    ? { settings: { ...firstSettings, ...row.settings }, version: row.version }
    : { settings: firstSettings, version: 0 }
}

/** Inside a transaction pass it: a second connection for each of many writers at once would exhaust the pool. */
export const readSettings = async (tx?: Tx): Promise<ClinicSettings> => (await readSettingsRow(tx)).settings

/** Today in the clinic's time zone. */
export const clinicToday = (settings: Pick<ClinicSettings, 'timeZone'>): Day =>
  dayOf(now(), settings.timeZone)

/** Stores the settings; version 0 means none were stored yet. Scores and letters already signed keep their own values. Throws StaleWrite. */
export const changeSettings = (actor: Actor, settings: ClinicSettings, version: number): Promise<void> =>
  transact(actor, async (tx, record) => {
    record({ action: 'settings.changed', objectType: 'settings', objectId: '1' })
    if (version === 0) {
      const made = (await tx.query(
        'INSERT IGNORE INTO clinic_settings (id, settings, changedAt, version) VALUES (1, ?, ?, 1)',
        [JSON.stringify(settings), now()],
      )) as { affectedRows: number }
      if (made.affectedRows === 1) return
    } else {
      const changed = (await tx.query(
        'UPDATE clinic_settings SET settings = ?, changedAt = ?, version = version + 1 WHERE id = 1 AND version = ?',
        [JSON.stringify(settings), now(), version],
      )) as { affectedRows: number }
      if (changed.affectedRows === 1) return
    }
    throw new StaleWrite()
  })
