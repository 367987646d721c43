import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** Which therapist holds a child; at most one row is open. */
@Entity('assignments')
@Index(['therapistId', 'endedAt'])
export class Assignment {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('uuid') therapistId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'therapistId' })
  therapist!: Relation<User>
  @Column('datetime', { precision: 6 }) startedAt!: Date
  @Column('datetime', { precision: 6, nullable: true }) endedAt!: Date | null
  @Column('varchar', { length: 500 }) reason!: string
  @Column('varchar', { length: 500, nullable: true }) endReason!: string | null
}
