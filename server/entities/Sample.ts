import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { SampleDetails, SampleType } from '../../shared/samples.ts'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** A handwriting sample as re-encoded by us; bytes are selected only on purpose. */
@Entity('samples')
@Index(['childId', 'takenOn'])
export class Sample {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('date') takenOn!: string
  @Column('json') details!: SampleDetails
  @Column('varchar', { length: 40 }) contentType!: SampleType
  @Column('int') bytes!: number
  @Column('int', { nullable: true }) width!: number | null
  @Column('int', { nullable: true }) height!: number | null
  @Column('decimal', { precision: 8, scale: 4, nullable: true }) pixelsPerMm!: string | null
  @Column('binary', { length: 32 }) sha256!: Buffer
  @Column('binary', { length: 32 }) originalSha256!: Buffer
  @Column('longblob', { select: false }) content!: Buffer
  @Column('mediumblob', { nullable: true, select: false }) thumbnail!: Buffer | null
  @Column('uuid') uploadedById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'uploadedById' })
  uploadedBy!: Relation<User>
  @Column('datetime', { precision: 6 }) uploadedAt!: Date
  @Column('datetime', { precision: 6, nullable: true }) removedAt!: Date | null
  @Column('uuid', { nullable: true }) removedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'removedById' })
  removedBy!: Relation<User | null>
}
