import { Column, Entity, PrimaryColumn } from 'typeorm'

/** Counted attempts by hashed key (account or address), shared by every process. */
@Entity('throttles')
export class Throttle {
  @PrimaryColumn('binary', { length: 32 }) keyHash!: Buffer
  @Column('int', { default: 0 }) failures!: number
  @Column('datetime', { precision: 6 }) windowStartedAt!: Date
  @Column('datetime', { precision: 6, nullable: true }) blockedUntil!: Date | null
}
