import { Column, Entity, PrimaryColumn, VersionColumn } from 'typeorm'
import type { ClinicSettings } from '../../shared/settings.ts'

/** One row: the settings of this clinic. */
@Entity('clinic_settings')
export class ClinicSetting {
  @PrimaryColumn('tinyint') id!: number
  @Column('json') settings!: ClinicSettings
  @Column('datetime', { precision: 6 }) changedAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
