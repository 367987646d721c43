import {
  Column,
  Entity,
  Index,
  JoinColumn,
  ManyToOne,
  PrimaryColumn,
  VersionColumn,
  type Relation,
} from 'typeorm'
import type { DeclineReferral, Priority, ReferralDetails, ReferralStatus } from '../../shared/referrals.ts'
import { Child } from './Child.ts'
import { SchoolClass } from './SchoolClass.ts'
import { User } from './User.ts'

/** What was sent in, kept whole; names and birth date also as columns for finding duplicates. */
@Entity('referrals')
@Index(['status', 'receivedOn'])
@Index(['familyName', 'givenName', 'birthDate'])
export class Referral {
  @PrimaryColumn('uuid') id!: string
  @Column('date') receivedOn!: string
  @Column('varchar', { length: 12 }) status!: ReferralStatus
  @Column('json') details!: ReferralDetails
  @Column('varchar', { length: 80 }) givenName!: string
  @Column('varchar', { length: 80 }) familyName!: string
  @Column('date') birthDate!: string
  @Column('uuid', { nullable: true }) schoolClassId!: string | null
  @ManyToOne(() => SchoolClass, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'schoolClassId' })
  schoolClass!: Relation<SchoolClass | null>
  @Column('varchar', { length: 10, nullable: true }) priority!: Priority | null
  @Column('uuid', { nullable: true }) childId!: string | null
  @ManyToOne(() => Child, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child | null>
  @Column('uuid') enteredById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'enteredById' })
  enteredBy!: Relation<User>
  @Column('uuid', { nullable: true }) decidedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'decidedById' })
  decidedBy!: Relation<User | null>
  @Column('datetime', { precision: 6, nullable: true }) decidedAt!: Date | null
  @Column('varchar', { length: 1000, nullable: true }) decisionReason!: string | null
  @Column('varchar', { length: 20, nullable: true }) outcome!: DeclineReferral['outcome'] | null
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
