import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { SessionNote } from './SessionNote.ts'
import { User } from './User.ts'

/** Append-only: later thoughts on a signed note. */
@Entity('note_addenda')
export class NoteAddendum {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') noteId!: string
  @ManyToOne(() => SessionNote, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'noteId' })
  note!: Relation<SessionNote>
  @Column('text') text!: string
  @Column('uuid') byId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'byId' })
  by!: Relation<User>
  @Column('datetime', { precision: 6 }) at!: Date
}
