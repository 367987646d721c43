import { Column, Entity, PrimaryColumn, VersionColumn } from 'typeorm'
import type { Hand, Role } from '../../shared/roles.ts'
import type { Theme } from '../../shared/users.ts'

/** One account an adult. `passwordHash` is never selected by default; decimals arrive as text. */
@Entity('users')
export class User {
  @PrimaryColumn('uuid') id!: string
  @Column('varchar', { length: 254, unique: true }) email!: string
  @Column('varchar', { length: 120 }) displayName!: string
  @Column('json') roles!: Role[]
  @Column('varchar', { length: 255, nullable: true, select: false }) passwordHash!: string | null
  @Column('varchar', { length: 8, default: 'left' }) workingHand!: Hand
  @Column('varchar', { length: 8, default: 'system' }) theme!: Theme
  @Column('boolean', { default: false }) newlyQualified!: boolean
  @Column('decimal', { precision: 3, scale: 2, nullable: true }) wte!: string | null
  @Column('datetime', { precision: 6, nullable: true }) disabledAt!: Date | null
  @Column('datetime', { precision: 6, nullable: true }) lastSignInAt!: Date | null
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
