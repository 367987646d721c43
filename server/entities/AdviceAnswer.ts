import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { AdviceReply } from '../../shared/schoolAdvice.ts'
import { SchoolAdvice } from './SchoolAdvice.ts'
import { User } from './User.ts'

/** Append-only: what the teacher says about an item. */
@Entity('advice_answers')
export class AdviceAnswer {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') adviceId!: string
  @ManyToOne(() => SchoolAdvice, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'adviceId' })
  advice!: Relation<SchoolAdvice>
  @Column('varchar', { length: 10 }) reply!: AdviceReply
  @Column('varchar', { length: 500, nullable: true }) reason!: string | null
  @Column('uuid') byId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'byId' })
  by!: Relation<User>
  @Column('datetime', { precision: 6 }) at!: Date
}
