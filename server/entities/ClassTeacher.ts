import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { SchoolClass } from './SchoolClass.ts'
import { User } from './User.ts'

/** Who teaches a class and since when; ended rows keep the history. */
@Entity('class_teachers')
export class ClassTeacher {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') schoolClassId!: string
  @ManyToOne(() => SchoolClass, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'schoolClassId' })
  schoolClass!: Relation<SchoolClass>
  @Column('uuid') teacherId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'teacherId' })
  teacher!: Relation<User>
  @Column('datetime', { precision: 6 }) startedAt!: Date
  @Column('datetime', { precision: 6, nullable: true }) endedAt!: Date | null
}
