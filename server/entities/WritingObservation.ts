import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { WritingObservationDetails } from '../../shared/writingObservations.ts'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** Append-only: posture, paper, grip and seat as seen on one day. */
@Entity('writing_observations')
export class WritingObservation {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('date') observedOn!: string
  @Column('json') details!: WritingObservationDetails
  @Column('uuid') observedById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'observedById' })
  observedBy!: Relation<User>
  @Column('datetime', { precision: 6 }) recordedAt!: Date
}
