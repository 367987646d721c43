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
import type { FormAnswers, FormScore } from '../../shared/forms.ts'
import type { Informant } from '../../shared/questionnaires.ts'
import { AnswerRequest } from './AnswerRequest.ts'
import { Child } from './Child.ts'
import { Guardian } from './Guardian.ts'
import { QuestionnaireForm } from './QuestionnaireForm.ts'
import { User } from './User.ts'

/** Answers of one occasion. Locked rows never change (trigger); a newer version names the one it replaces. */
@Entity('questionnaire_responses')
@Unique(['replacesId'])
@Unique(['requestId'])
export class QuestionnaireResponse {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('varchar', { length: 40 }) formVersion!: string
  @ManyToOne(() => QuestionnaireForm, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'formVersion' })
  form!: Relation<QuestionnaireForm>
  @Column('varchar', { length: 20 }) informant!: Informant
  @Column('varchar', { length: 120, nullable: true }) respondentName!: string | null
  @Column('date') answeredOn!: string
  @Column('json') answers!: FormAnswers
  @Column('varchar', { length: 1000, nullable: true }) comment!: string | null
  @Column('varchar', { length: 40 }) cutOffSet!: string
  @Column('json', { nullable: true }) score!: FormScore | null
  @Column('datetime', { precision: 6, nullable: true }) lockedAt!: Date | null
  @Column('uuid', { nullable: true }) lockedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'lockedById' })
  lockedBy!: Relation<User | null>
  @Column('uuid', { nullable: true }) requestId!: string | null
  @ManyToOne(() => AnswerRequest, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'requestId' })
  request!: Relation<AnswerRequest | null>
  /** The carer who answers for themselves; null when staff write answers down or a teacher answers. */
  @Column('uuid', { nullable: true }) guardianId!: string | null
  @ManyToOne(() => Guardian, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'guardianId' })
  guardian!: Relation<Guardian | null>
  /** Null when a carer without an account answers by a link. */
  @Column('uuid', { nullable: true }) startedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'startedById' })
  startedBy!: Relation<User | null>
  @Column('uuid', { nullable: true }) replacesId!: string | null
  @ManyToOne(() => QuestionnaireResponse, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'replacesId' })
  replaces!: Relation<QuestionnaireResponse | null>
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
