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
import type { HistoryDetails, HistoryInformant } from '../../shared/histories.ts'
import { AnswerRequest } from './AnswerRequest.ts'
import { Child } from './Child.ts'
import { Guardian } from './Guardian.ts'
import { User } from './User.ts'

/** What a family told of the child so far. Closed once sent (trigger); a newer one names the one it replaces. */
@Entity('histories')
@Unique(['replacesId'])
@Unique(['requestId'])
export class History {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('varchar', { length: 12 }) informant!: HistoryInformant
  @Column('varchar', { length: 120, nullable: true }) respondentName!: string | null
  @Column('date') answeredOn!: string
  @Column('json') details!: HistoryDetails
  @Column('uuid', { nullable: true }) requestId!: string | null
  @ManyToOne(() => AnswerRequest, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'requestId' })
  request!: Relation<AnswerRequest | null>
  /** The carer who answers; null when a therapist writes down what was told. */
  @Column('uuid', { nullable: true }) guardianId!: string | null
  @ManyToOne(() => Guardian, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'guardianId' })
  guardian!: Relation<Guardian | null>
  /** Null when a carer without an account answers by a link. */
  @Column('uuid', { nullable: true }) startedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'startedById' })
  startedBy!: Relation<User | null>
  @Column('datetime', { precision: 6, nullable: true }) lockedAt!: Date | null
  @Column('uuid', { nullable: true }) lockedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'lockedById' })
  lockedBy!: Relation<User | null>
  @Column('uuid', { nullable: true }) replacesId!: string | null
  @ManyToOne(() => History, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'replacesId' })
  replaces!: Relation<History | null>
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
