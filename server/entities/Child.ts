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
import type { ScriptDirection } from '../../shared/referrals.ts'
import type { WritingHand } from '../../shared/children.ts'
import { SchoolClass } from './SchoolClass.ts'

@Entity('children')
@Index(['familyName', 'givenName'])
@Index(['birthDate'])
export class Child {
  @PrimaryColumn('uuid') id!: string
  @Column('varchar', { length: 16, unique: true }) recordNumber!: string
  @Column('varchar', { length: 80 }) givenName!: string
  @Column('varchar', { length: 80 }) familyName!: string
  @Column('varchar', { length: 80, nullable: true }) preferredName!: string | null
  @Column('date') birthDate!: string
  @Column('varchar', { length: 120, nullable: true }) homeLanguages!: string | null
  @Column('varchar', { length: 60, nullable: true }) interpreterLanguage!: string | null
  @Column('varchar', { length: 8, default: 'ltr' }) scriptDirection!: ScriptDirection
  @Column('boolean', { default: false }) lookedAfter!: boolean
  @Column('boolean', { default: false }) consentsForSelf!: boolean
  @Column('varchar', { length: 8, nullable: true }) writingHand!: WritingHand | null
  @Column('uuid', { nullable: true }) schoolClassId!: string | null
  @ManyToOne(() => SchoolClass, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'schoolClassId' })
  schoolClass!: Relation<SchoolClass | null>
  @Column('date', { nullable: true }) nextReviewOn!: string | null
  @Column('varchar', { length: 1000, nullable: true }) strengths!: string | null
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
