import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Role } from '../../shared/roles.ts'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** What somebody must do, and by when. Either a person or a role holds it. */
@Entity('tasks')
@Index(['assigneeId', 'doneAt'])
@Index(['childId', 'doneAt'])
export class Task {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid', { nullable: true }) childId!: string | null
  @ManyToOne(() => Child, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child | null>
  @Column('varchar', { length: 40 }) kind!: string
  @Column('varchar', { length: 300 }) text!: string
  @Column('date', { nullable: true }) dueOn!: string | null
  @Column('uuid', { nullable: true }) assigneeId!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'assigneeId' })
  assignee!: Relation<User | null>
  @Column('varchar', { length: 20, nullable: true }) forRole!: Role | null
  @Column('datetime', { precision: 6, nullable: true }) doneAt!: Date | null
  @Column('uuid', { nullable: true }) doneById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'doneById' })
  doneBy!: Relation<User | null>
  @Column('datetime', { precision: 6 }) createdAt!: Date
}
