import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { User } from './User.ts'

/** A sign-in. Only the SHA-256 of the cookie's id is kept; `endedAt` is the tombstone that makes sign-out final. */
@Entity('user_sessions')
export class UserSession {
  @PrimaryColumn('binary', { length: 32 }) idHash!: Buffer
  @Column('mediumtext') data!: string
  @Column('uuid', { nullable: true }) userId!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'userId' })
  user!: Relation<User | null>
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @Column('datetime', { precision: 6 }) lastSeenAt!: Date
  @Column('datetime', { precision: 6 }) expiresAt!: Date
  @Column('datetime', { precision: 6, nullable: true }) endedAt!: Date | null
}
