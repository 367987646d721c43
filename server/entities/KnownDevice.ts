import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import { User } from './User.ts'

/** A browser in which this person has signed in before: strangers' guesses cannot lock it out. */
@Entity('known_devices')
export class KnownDevice {
  @PrimaryColumn('uuid') id!: string
  @Column('binary', { length: 32, unique: true }) tokenHash!: Buffer
  @Column('uuid') userId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'userId' })
  user!: Relation<User>
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @Column('datetime', { precision: 6 }) lastUsedAt!: Date
}
