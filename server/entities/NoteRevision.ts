import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, Unique, type Relation } from 'typeorm'
import type { NoteDraft } from '../../shared/sessionNotes.ts'
import { SessionNote } from './SessionNote.ts'
import { User } from './User.ts'

/** Append-only: every saved text of a note. */
@Entity('note_revisions')
@Unique(['noteId', 'revision'])
export class NoteRevision {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') noteId!: string
  @ManyToOne(() => SessionNote, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'noteId' })
  note!: Relation<SessionNote>
  @Column('int') revision!: number
  @Column('json') content!: NoteDraft
  @Column('uuid') byId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'byId' })
  by!: Relation<User>
  @Column('datetime', { precision: 6 }) at!: Date
}
