import { Column, Entity, PrimaryColumn, Unique } from 'typeorm'

/** Remembers which row a create made, so that a repeated request makes no second one. */
@Entity('idempotency_keys')
@Unique(['userId', 'keyValue'])
export class IdempotencyKey {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') userId!: string
  @Column('varchar', { length: 64 }) keyValue!: string
  @Column('binary', { length: 32 }) digest!: Buffer
  @Column('uuid') resultId!: string
  @Column('datetime', { precision: 6 }) createdAt!: Date
}
