import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { TokenPurpose } from '../../shared/users.ts'
import { User } from './User.ts'

/** A single-use link. Only the SHA-256 of the token is kept. */
@Entity('user_tokens')
export class UserToken {
  @PrimaryColumn('uuid') id!: string
  @Column('binary', { length: 32, unique: true }) tokenHash!: Buffer
  @Column('uuid') userId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'userId' })
  user!: Relation<User>
  @Column('varchar', { length: 20 }) purpose!: TokenPurpose
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @Column('datetime', { precision: 6 }) expiresAt!: Date
  @Column('datetime', { precision: 6, nullable: true }) usedAt!: Date | null
}
