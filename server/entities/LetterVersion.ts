import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { LetterApproval, LetterDraft } from '../../shared/letters.ts'
import { Letter } from './Letter.ts'
import { User } from './User.ts'

/** Append-only: exactly what was approved, with its PDF and hash. */
@Entity('letter_versions')
export class LetterVersion {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') letterId!: string
  @ManyToOne(() => Letter, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'letterId' })
  letter!: Relation<Letter>
  @Column('json') content!: LetterDraft
  @Column('json') overrides!: LetterApproval
  @Column('longblob', { select: false }) pdf!: Buffer
  @Column('int') pdfBytes!: number
  @Column('binary', { length: 32 }) pdfSha256!: Buffer
  @Column('uuid') approvedById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'approvedById' })
  approvedBy!: Relation<User>
  @Column('datetime', { precision: 6 }) approvedAt!: Date
}
