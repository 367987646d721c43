import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { DeliveryState } from '../../shared/letters.ts'
import { Guardian } from './Guardian.ts'
import { Letter } from './Letter.ts'
import { LetterVersion } from './LetterVersion.ts'
import { OutboxMessage } from './OutboxMessage.ts'

/** One recipient of one letter. */
@Entity('letter_deliveries')
export class LetterDelivery {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') letterId!: string
  @ManyToOne(() => Letter, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'letterId' })
  letter!: Relation<Letter>
  @Column('uuid') letterVersionId!: string
  @ManyToOne(() => LetterVersion, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'letterVersionId' })
  letterVersion!: Relation<LetterVersion>
  @Column('uuid') guardianId!: string
  @ManyToOne(() => Guardian, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'guardianId' })
  guardian!: Relation<Guardian>
  @Column('varchar', { length: 12 }) channel!: 'link' | 'attachment'
  @Column('uuid') outboxMessageId!: string
  @ManyToOne(() => OutboxMessage, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'outboxMessageId' })
  outboxMessage!: Relation<OutboxMessage>
  @Column('varchar', { length: 12 }) state!: DeliveryState
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @Column('datetime', { precision: 6 }) linkEndsAt!: Date
  @Column('datetime', { precision: 6, nullable: true }) openedAt!: Date | null
}
