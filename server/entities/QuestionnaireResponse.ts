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
import type { HandUseScore } from '../../shared/handUse.ts'
import type { HandUseAnswers, Informant } from '../../shared/questionnaires.ts'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** Answers of one occasion. Locked rows never change (trigger); a newer version names the one it replaces. */
@Entity('questionnaire_responses')
@Unique(['replacesId'])
export class QuestionnaireResponse {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('varchar', { length: 40 }) formVersion!: string
  @Column('varchar', { length: 20 }) informant!: Informant
  @Column('varchar', { length: 120, nullable: true }) respondentName!: string | null
  @Column('date') answeredOn!: string
  @Column('json') answers!: HandUseAnswers
  @Column('varchar', { length: 1000, nullable: true }) comment!: string | null
  @Column('varchar', { length: 40 }) cutOffSet!: string
  @Column('json', { nullable: true }) score!: HandUseScore | null
  @Column('datetime', { precision: 6, nullable: true }) lockedAt!: Date | null
  @Column('uuid', { nullable: true }) lockedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'lockedById' })
  lockedBy!: Relation<User | null>
  @Column('uuid') startedById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'startedById' })
  startedBy!: Relation<User>
  @Column('uuid', { nullable: true }) replacesId!: string | null
  @ManyToOne(() => QuestionnaireResponse, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'replacesId' })
  replaces!: Relation<QuestionnaireResponse | null>
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
