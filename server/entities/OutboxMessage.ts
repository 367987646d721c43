import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { User } from './User.ts'

/** What an e-mail is for; decides which checks run again before it leaves. */
export type OutboxKind =
  'letter' | 'invitation' | 'password_reset' | 'password_changed' | 'delivery_failed' | 'answer_request'

/**
 * An e-mail, frozen when it was decided on; written in the transaction of the act. Message-ID and bytes never change, but
 * one that brought a link loses its bytes once it is sent, given up or cancelled.
 */
@Entity('outbox_messages')
@Index(['state', 'nextAttemptAt'])
export class OutboxMessage {
  @PrimaryColumn('uuid') id!: string
  @Column('varchar', { length: 30 }) kind!: OutboxKind
  @Column('varchar', { length: 254 }) recipient!: string
  @Column('varchar', { length: 200, unique: true }) messageId!: string
  @Column('longblob', { select: false }) mime!: Buffer
  @Column('binary', { length: 32 }) mimeSha256!: Buffer
  @Column('varchar', { length: 12 }) state!: 'queued' | 'sending' | 'sent' | 'failed' | 'cancelled'
  @Column('int', { default: 0 }) attempts!: number
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @Column('datetime', { precision: 6 }) nextAttemptAt!: Date
  @Column('varchar', { length: 64, nullable: true }) leaseOwner!: string | null
  @Column('datetime', { precision: 6, nullable: true }) leaseUntil!: Date | null
  @Column('datetime', { precision: 6, nullable: true }) lastTriedAt!: Date | null
  @Column('datetime', { precision: 6, nullable: true }) sentAt!: Date | null
  @Column('varchar', { length: 300, nullable: true }) problem!: string | null
  @Column('uuid', { nullable: true }) enqueuedById!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'enqueuedById' })
  enqueuedBy!: Relation<User | null>
}
