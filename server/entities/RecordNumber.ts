import { Column, Entity, PrimaryColumn } from 'typeorm'

/** Running number of each referral year. */
@Entity('record_numbers')
export class RecordNumber {
  @PrimaryColumn('smallint') year!: number
  @Column('int') lastNumber!: number
}
