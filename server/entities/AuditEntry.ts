import { Column, Entity, Index, PrimaryGeneratedColumn, Unique } from 'typeorm'

/** Append-only and chained: hash = SHA-256(previous hash + canonical entry). */
@Entity('audit_entries')
@Unique(['chain', 'position'])
@Index(['childId', 'at'])
export class AuditEntry {
  @PrimaryGeneratedColumn({ type: 'bigint', unsigned: true }) id!: string
  @Column('varchar', { length: 64 }) chain!: string
  @Column('int', { unsigned: true }) position!: number
  @Column('datetime', { precision: 6 }) at!: Date
  @Column('uuid', { nullable: true }) actorId!: string | null
  @Column('varchar', { length: 120 }) roles!: string
  @Column('varchar', { length: 30, nullable: true }) relation!: string | null
  @Column('varchar', { length: 60 }) action!: string
  @Column('varchar', { length: 40, nullable: true }) objectType!: string | null
  @Column('varchar', { length: 64, nullable: true }) objectId!: string | null
  @Column('uuid', { nullable: true }) childId!: string | null
  @Column('varchar', { length: 8 }) result!: 'allowed' | 'denied'
  @Column('varchar', { length: 64 }) requestId!: string
  @Column('text', { nullable: true }) detail!: string | null
  @Column('binary', { length: 32 }) previousHash!: Buffer
  @Column('binary', { length: 32 }) hash!: Buffer
}
