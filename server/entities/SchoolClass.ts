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
import { School } from './School.ts'

@Entity('school_classes')
@Unique(['schoolId', 'name', 'schoolYear'])
export class SchoolClass {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') schoolId!: string
  @ManyToOne(() => School, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'schoolId' })
  school!: Relation<School>
  @Column('varchar', { length: 60 }) name!: string
  @Column('smallint') schoolYear!: number
  @Column('varchar', { length: 20, nullable: true }) ages!: string | null
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
