import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, VersionColumn, type Relation } from 'typeorm'
import type { GuardianRelation, ParentalResponsibility } from '../../shared/guardians.ts'
import { Child } from './Child.ts'
import { User } from './User.ts'

/** A carer of one child. The link to an account counts once verified, while not restricted and not ended. */
@Entity('guardians')
export class Guardian {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('uuid', { nullable: true }) userId!: string | null
  @ManyToOne(() => User, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'userId' })
  user!: Relation<User | null>
  @Column('varchar', { length: 120 }) name!: string
  @Column('varchar', { length: 20 }) relation!: GuardianRelation
  @Column('varchar', { length: 8 }) parentalResponsibility!: ParentalResponsibility
  @Column('boolean', { default: false }) courtOrder!: boolean
  @Column('boolean', { default: true }) safeToContact!: boolean
  @Column('boolean', { default: false }) restricted!: boolean
  @Column('varchar', { length: 500, nullable: true }) restrictedReason!: string | null
  @Column('varchar', { length: 254, nullable: true }) email!: string | null
  @Column('varchar', { length: 30, nullable: true }) phone!: string | null
  @Column('varchar', { length: 300, nullable: true }) address!: string | null
  @Column('datetime', { precision: 6, nullable: true }) verifiedAt!: Date | null
  @Column('datetime', { precision: 6, nullable: true }) endedAt!: Date | null
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
