import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryColumn,
  Unique,
  VersionColumn,
  type Relation,
} from 'typeorm'
import type { MeasureDetails, MeasureKind, MeasureScore } from '../../shared/measures.ts'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** One measure of one day as raw trials. Locked rows never change (trigger); a newer one names the one it replaces. */
@Entity('measures')
@Unique(['replacesId'])
export class Measure {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('varchar', { length: 20 }) kind!: MeasureKind
  @Column('varchar', { length: 40 }) methodVersion!: string
  @Column('date') measuredOn!: string
  @Column('json') details!: MeasureDetails
  /** Computed by the server when locked; null before. */
  @Column('json', { nullable: true }) score!: MeasureScore | null
  /** Why this part was not done; null when it was. */
  @Column('varchar', { length: 300, nullable: true }) notDoneReason!: string | null
  @Column('varchar', { length: 1000, nullable: true }) comment!: string | null
  @Column('uuid') startedById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'startedById' })
  startedBy!: Relation<User>
  @Column('datetime', { precision: 6, nullable: true }) lockedAt!: Date | null
  @Column('uuid', { nullable: true }) lockedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'lockedById' })
  lockedBy!: Relation<User | null>
  @Column('uuid', { nullable: true }) replacesId!: string | null
  @ManyToOne(() => Measure, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'replacesId' })
  replaces!: Relation<Measure | null>
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
