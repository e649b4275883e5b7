import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Junction } from './Junction.js'
import type { Project } from './Project.js'

/** Scans of one junction at several bias intensities or voltages; each scan names the series it belongs to. */
@Entity({ name: 'bias_series' })
@Index('bias_series_of_junction', ['junctionId'])
export class BiasSeries {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  projectId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'bias_series_project_exists' })
  project: Relation<Project>

  @Column('uuid')
  deviceId: string

  @Column('uuid')
  junctionId: string

  @ManyToOne('Junction', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'junctionId', foreignKeyConstraintName: 'bias_series_junction_exists' })
  junction: Relation<Junction>

  @Column('varchar', { length: 120 })
  name: string

  @Column('varchar', { length: 20 })
  varied: 'irradiance' | 'voltage'

  @Column('int')
  version: number
}
