import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { DetectorContent, LightSourceContent, SetUpContent } from '../../../shared/contract/bench.js'
import { jsonColumn } from '../transformers.js'
import type { Project } from './Project.js'
import type { User } from './User.js'

/** What each kind of thing at the measuring bench holds. */
export interface BenchContents {
  'set-up': SetUpContent
  'light-source': LightSourceContent
  detector: DetectorContent
}
export type BenchKind = keyof BenchContents

/** A set-up, a light source or a reference detector of a project; names are unique among those of a kind. */
@Entity({ name: 'bench_item' })
@Index('bench_item_name_in_project', ['projectId', 'kind', 'name'], { unique: true })
export class BenchItem<Kind extends BenchKind = BenchKind> {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  projectId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'bench_item_project_exists' })
  project: Relation<Project>

  @Column('varchar', { length: 20 })
  kind: Kind

  @Column('varchar', { length: 120 })
  name: string

  @Column('longtext', { transformer: jsonColumn<BenchContents[BenchKind]>() })
  content: BenchContents[Kind]

  @Column('int')
  version: number

  @Column('datetime', { precision: 3 })
  createdAt: Date

  @Column('datetime', { precision: 3 })
  updatedAt: Date

  @Column('uuid')
  updatedById: string

  @ManyToOne('User', { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'updatedById', foreignKeyConstraintName: 'bench_item_editor_exists' })
  updatedBy: Relation<User>
}
