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
import type { ConclusionContent, ConclusionState, SignedEvidence } from '../../shared/conclusions.ts'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** A therapist's own reasoned summary. Closed once signed (trigger); a later one names the one it replaces. */
@Entity('conclusions')
@Unique(['replacesId'])
export class Conclusion {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('uuid') authorId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'authorId' })
  author!: Relation<User>
  @Column('varchar', { length: 26 }) state!: ConclusionState
  @Column('json') content!: ConclusionContent
  /** The measures, disagreements and cautions as they stood when it was signed; the report is drawn from them. */
  @Column('json', { nullable: true }) evidence!: SignedEvidence | null
  @Column('datetime', { precision: 6, nullable: true }) signedAt!: Date | null
  @Column('datetime', { precision: 6, nullable: true }) countersignedAt!: Date | null
  @Column('uuid', { nullable: true }) countersignedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'countersignedById' })
  countersignedBy!: Relation<User | null>
  @Column('uuid', { nullable: true }) replacesId!: string | null
  @ManyToOne(() => Conclusion, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'replacesId' })
  replaces!: Relation<Conclusion | null>
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
