import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, Unique, type Relation } from 'typeorm'
import { NoteRevision } from './NoteRevision.ts'
import { SessionNote } from './SessionNote.ts'
import { User } from './User.ts'

/** Append-only: who signed which text. The hash is SHA-256 of the canonical text. */
@Entity('note_signatures')
@Unique(['noteId', 'kind'])
export class NoteSignature {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') noteId!: string
  @ManyToOne(() => SessionNote, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'noteId' })
  note!: Relation<SessionNote>
  @Column('uuid') revisionId!: string
  @ManyToOne(() => NoteRevision, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'revisionId' })
  revision!: Relation<NoteRevision>
  @Column('varchar', { length: 20 }) kind!: 'author' | 'countersignature'
  @Column('uuid') signedById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'signedById' })
  signedBy!: Relation<User>
  @Column('varchar', { length: 30 }) signedRole!: string
  @Column('datetime', { precision: 6 }) signedAt!: Date
  @Column('varchar', { length: 60 }) timeZone!: string
  @Column('binary', { length: 32 }) textHash!: Buffer
  @Column('varchar', { length: 300, nullable: true }) lateReason!: string | null
}
