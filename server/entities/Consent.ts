import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, Unique, type Relation } from 'typeorm'
import type { ConsentBasis, ConsentMethod, ConsentPurpose } from '../../shared/consents.ts'
import { Child } from './Child.ts'
import { Guardian } from './Guardian.ts'
import { User } from './User.ts'

/** Append-only. A withdrawal is a new row that names the one it ends. */
@Entity('consents')
@Index(['childId', 'purpose'])
@Unique(['withdrawsId'])
export class Consent {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') childId!: string
  @ManyToOne(() => Child, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'childId' })
  child!: Relation<Child>
  @Column('uuid', { nullable: true }) guardianId!: string | null
  @ManyToOne(() => Guardian, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'guardianId' })
  guardian!: Relation<Guardian | null>
  @Column('varchar', { length: 40 }) purpose!: ConsentPurpose
  @Column('varchar', { length: 10 }) kind!: 'given' | 'withdrawn'
  @Column('uuid', { nullable: true }) withdrawsId!: string | null
  @ManyToOne(() => Consent, { nullable: true, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'withdrawsId' })
  withdraws!: Relation<Consent | null>
  @Column('varchar', { length: 30 }) basis!: ConsentBasis
  @Column('varchar', { length: 20 }) method!: ConsentMethod
  @Column('varchar', { length: 120 }) givenByName!: string
  @Column('datetime', { precision: 6 }) at!: Date
  @Column('datetime', { precision: 6, nullable: true }) expiresAt!: Date | null
  @Column('varchar', { length: 500, nullable: true }) reason!: string | null
  @Column('uuid') recordedById!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'recordedById' })
  recordedBy!: Relation<User>
  @Column('datetime', { precision: 6 }) recordedAt!: Date
}
