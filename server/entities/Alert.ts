import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, VersionColumn, type Relation } from 'typeorm'
import type { Attention } from '../../shared/attention.ts'
import type { AlertOrigin } from '../../shared/alerts.ts'
import type { RedFlagUrgency } from '../../shared/redFlagRows.ts'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** A red flag on the record, and who did what about it. */
@Entity('alerts')
export class Alert {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('varchar', { length: 40 }) flag!: string
  @Column('varchar', { length: 500 }) text!: string
  @Column('varchar', { length: 8 }) level!: Attention
  @Column('varchar', { length: 16 }) urgency!: RedFlagUrgency
  /** What is usually done; null where the text says it. */
  @Column('varchar', { length: 500, nullable: true }) advice!: string | null
  @Column('varchar', { length: 16 }) origin!: AlertOrigin
  /** The answer, measure or note it was seen in; null for a referral and what a person raised. */
  @Column('uuid', { nullable: true }) originId!: string | null
  /** No routine block of sessions is booked until somebody has written down what was done. */
  @Column('boolean', { default: false }) holdsBooking!: boolean
  /** Null when an answer given at home raised it. */
  @Column('uuid', { nullable: true }) raisedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'raisedById' })
  raisedBy!: Relation<User | null>
  @Column('datetime', { precision: 6 }) raisedAt!: Date
  @Column('datetime', { precision: 6, nullable: true }) actedAt!: Date | null
  @Column('uuid', { nullable: true }) actedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'actedById' })
  actedBy!: Relation<User | null>
  @Column('varchar', { length: 1000, nullable: true }) action!: string | null
  @VersionColumn({ type: 'int' }) version!: number
}
