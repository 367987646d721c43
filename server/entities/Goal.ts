import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, VersionColumn, type Relation } from 'typeorm'
import type { GoalDetails, GoalOutcome } from '../../shared/goals.ts'
import { Child } from './Child.ts'
import { User } from './User.ts'

@Entity('goals')
export class Goal {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('json') details!: GoalDetails
  @Column('date') setOn!: string
  @Column('date', { nullable: true }) endedOn!: string | null
  @Column('varchar', { length: 20, nullable: true }) outcome!: GoalOutcome | null
  @Column('varchar', { length: 300, nullable: true }) endReason!: string | null
  @Column('uuid') setById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'setById' })
  setBy!: Relation<User>
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
