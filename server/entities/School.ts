import { Column, Entity, PrimaryColumn, VersionColumn } from 'typeorm'

@Entity('schools')
export class School {
  @PrimaryColumn('uuid') id!: string
  @Column('varchar', { length: 120, unique: true }) name!: string
  @Column('varchar', { length: 80, nullable: true }) town!: string | null
  @Column('datetime', { precision: 6 }) createdAt!: Date
  @VersionColumn({ type: 'int' }) version!: number
}
