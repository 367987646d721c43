import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Goal } from './Goal.ts'
import { User } from './User.ts'

/** Append-only: a level given to a goal on one day. */
@Entity('goal_ratings')
export class GoalRating {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') goalId!: string
  @ManyToOne(() => Goal, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'goalId' })
  goal!: Relation<Goal>
  @Column('tinyint') level!: number
  @Column('date') ratedOn!: string
  @Column('varchar', { length: 500, nullable: true }) note!: string | null
  @Column('uuid') ratedById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'ratedById' })
  ratedBy!: Relation<User>
  @Column('datetime', { precision: 6 }) createdAt!: Date
}
