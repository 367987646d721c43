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
import type { NoteState, SessionType } from '../../shared/sessionNotes.ts'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** Head of a note; its text lives in append-only revisions. `endedAt` is the end of the session in UTC. Signed heads never change (trigger). */
@Entity('session_notes')
@Index(['state', 'endedAt'])
@Index(['childId', 'heldOn'])
export class SessionNote {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('uuid') authorId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'authorId' })
  author!: Relation<User>
  @Column('date') heldOn!: string
  @Column('char', { length: 5 }) startTime!: string
  @Column('smallint') minutes!: number
  @Column('datetime', { precision: 6 }) endedAt!: Date
  @Column('varchar', { length: 20 }) type!: SessionType
  @Column('varchar', { length: 30 }) state!: NoteState
  @Column('varchar', { length: 160 }) summary!: string
  @Column('datetime', { precision: 6, nullable: true }) discardedAt!: Date | null
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
