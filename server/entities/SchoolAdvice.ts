import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** A library item a therapist gave to the school. */
@Entity('school_advice')
@Index(['childId', 'endedAt'])
export class SchoolAdvice {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('varchar', { length: 8 }) itemId!: string
  @Column('varchar', { length: 300 }) because!: string
  @Column('date') checkBy!: string
  @Column('datetime', { precision: 6 }) publishedAt!: Date
  @Column('uuid') publishedById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'publishedById' })
  publishedBy!: Relation<User>
  @Column('datetime', { precision: 6, nullable: true }) endedAt!: Date | null
  @Column('uuid', { nullable: true }) endedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'endedById' })
  endedBy!: Relation<User | null>
}
