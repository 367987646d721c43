import { Column, Entity, PrimaryColumn } from 'typeorm'

/** Last link of each chain; locked while a link is added. One chain for each process. */
@Entity('audit_heads')
export class AuditHead {
  @PrimaryColumn('varchar', { length: 64 }) chain!: string
  @Column('int', { unsigned: true }) position!: number
  @Column('binary', { length: 32 }) hash!: Buffer
}
