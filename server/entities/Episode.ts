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
import type { EpisodeState } from '../../shared/episodes.ts'
import type { Priority } from '../../shared/referrals.ts'
import { Child } from './Child.ts'
import { Referral } from './Referral.ts'

/** Referral to discharge. A re-referral opens a new one. */
@Entity('episodes')
@Index(['state'])
export class Episode {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('uuid', { nullable: true }) referralId!: string | null
  @ManyToOne(() => Referral, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'referralId' })
  referral!: Relation<Referral | null>
  @Column('varchar', { length: 20 }) state!: EpisodeState
  @Column('date') receivedOn!: string
  @Column('varchar', { length: 10, default: 'routine' }) priority!: Priority
  @Column('date', { nullable: true }) firstSeenOn!: string | null
  @Column('date', { nullable: true }) closedOn!: string | null
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
