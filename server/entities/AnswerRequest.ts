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
import type { AnswererKind, LinkEndReason, RequestedForm } from '../../shared/answerRequests.ts'
import { Child } from './Child.ts'
import { Guardian } from './Guardian.ts'
import { OutboxMessage } from './OutboxMessage.ts'
import { QuestionnaireForm } from './QuestionnaireForm.ts'
import { User } from './User.ts'

/** The clinic asks one carer or one teacher for one form. Only the SHA-256 of the link's token is kept. */
@Entity('answer_requests')
@Index(['answeredAt', 'expiresAt'])
export class AnswerRequest {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('varchar', { length: 16 }) asks!: RequestedForm
  /** Null for the history. */
  @Column('varchar', { length: 40, nullable: true }) formId!: string | null
  @ManyToOne(() => QuestionnaireForm, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'formId' })
  form!: Relation<QuestionnaireForm | null>
  @Column('varchar', { length: 10 }) answerer!: AnswererKind
  @Column('uuid', { nullable: true }) guardianId!: string | null
  @ManyToOne(() => Guardian, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'guardianId' })
  guardian!: Relation<Guardian | null>
  @Column('uuid', { nullable: true }) teacherId!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'teacherId' })
  teacher!: Relation<User | null>
  /** Null when the answerer signs in and no link was sent. */
  @Column('binary', { length: 32, unique: true, nullable: true }) tokenHash!: Buffer | null
  @Column('datetime', { precision: 6 }) askedAt!: Date
  @Column('uuid') askedById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'askedById' })
  askedBy!: Relation<User>
  @Column('datetime', { precision: 6 }) expiresAt!: Date
  /** Reminders sent so far: one after 7 days, one after 14, and those sent by hand. */
  @Column('int', { default: 0 }) reminders!: number
  @Column('datetime', { precision: 6, nullable: true }) remindedAt!: Date | null
  /** When something was last saved. Autosaves leave the version alone: it belongs to the clinic's own changes. */
  @Column('datetime', { precision: 6, nullable: true }) savedAt!: Date | null
  /** The newest e-mail about it; older ones no longer count. */
  @Column('uuid', { nullable: true }) mailId!: string | null
  @ManyToOne(() => OutboxMessage, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'mailId' })
  mail!: Relation<OutboxMessage | null>
  @Column('datetime', { precision: 6, nullable: true }) answeredAt!: Date | null
  @Column('datetime', { precision: 6, nullable: true }) cancelledAt!: Date | null
  /** Null when somebody withdrew it. */
  @Column('varchar', { length: 10, nullable: true }) cancelledWhy!: LinkEndReason | null
  /** Wrong dates of birth given with its links, all together. */
  @Column('int', { default: 0 }) wrongDates!: number
  @VersionColumn({ type: 'int' }) version!: number
}
