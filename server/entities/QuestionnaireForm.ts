import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, Unique, type Relation } from 'typeorm'
import type { FormDefinition } from '../../shared/forms.ts'
import { User } from './User.ts'

/** One edition of a questionnaire. Its text never changes (trigger); another wording is another edition. */
@Entity('questionnaire_forms')
@Unique(['formKey', 'edition'])
export class QuestionnaireForm {
  /** `<formKey>.v<edition>` */
  @PrimaryColumn('varchar', { length: 40 }) id!: string
  @Column('varchar', { length: 32 }) formKey!: string
  @Column('int') edition!: number
  @Column('json') definition!: FormDefinition
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @Column('uuid', { nullable: true }) createdById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'createdById' })
  createdBy!: Relation<User | null>
  /** From then on nobody begins with it; what was begun is finished. */
  @Column('datetime', { precision: 6, nullable: true }) retiredAt!: Date | null
  @Column('uuid', { nullable: true }) retiredById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'retiredById' })
  retiredBy!: Relation<User | null>
}
