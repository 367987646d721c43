import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { EpisodeState } from '../../shared/episodes.ts'
import { Episode } from './Episode.ts'
import { User } from './User.ts'

/** Append-only: who moved an episode, when and why. */
@Entity('episode_changes')
export class EpisodeChange {
  @PrimaryColumn('uuid') id!: string
  @Column('uuid') episodeId!: string
  @ManyToOne(() => Episode, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'episodeId' })
  episode!: Relation<Episode>
  @Column('varchar', { length: 20, nullable: true }) fromState!: EpisodeState | null
  @Column('varchar', { length: 20 }) toState!: EpisodeState
  @Column('varchar', { length: 1000 }) reason!: string
  @Column('uuid') byId!: string
  @ManyToOne(() => User, { nullable: false, onDelete: 'RESTRICT', onUpdate: 'RESTRICT' })
  @JoinColumn({ name: 'byId' })
  by!: Relation<User>
  @Column('datetime', { precision: 6 }) at!: Date
}
