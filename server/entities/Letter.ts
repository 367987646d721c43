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
import type { LetterDraft, LetterFact, LetterKind, LetterState } from '../../shared/letters.ts'
import { Child } from './Child.ts'
import { LetterVersion } from './LetterVersion.ts'
import { User } from './User.ts'

/** A letter and the snapshot of facts it was assembled from. The text may change only while a draft (trigger). */
@Entity('letters')
@Index(['state'])
@Index(['childId'])
export class Letter {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('varchar', { length: 20 }) kind!: LetterKind
  @Column('varchar', { length: 40 }) templateVersion!: string
  @Column('varchar', { length: 20 }) state!: LetterState
  @Column('json') content!: LetterDraft
  @Column('json') facts!: LetterFact[]
  @Column('uuid') authorId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'authorId' })
  author!: Relation<User>
  @Column('uuid', { nullable: true }) approvedVersionId!: string | null
  @ManyToOne(() => LetterVersion, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'approvedVersionId' })
  approvedVersion!: Relation<LetterVersion | null>
  @Column('varchar', { length: 1000, nullable: true }) returnedReason!: string | null
  @Column('datetime', { precision: 6, nullable: true }) discardedAt!: Date | null
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @Column('datetime', { precision: 6 }) changedAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
