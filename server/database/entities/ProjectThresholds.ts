import { Column, Entity, JoinColumn, OneToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { ThresholdSettings } from '../../../shared/physics/checks/index.js'
import { jsonColumn } from '../transformers.js'
import type { Project } from './Project.js'

/** The thresholds that a project changed; none for a project in which every one has its default. */
@Entity({ name: 'project_thresholds' })
export class ProjectThresholds {
  @PrimaryColumn('uuid')
  projectId: string

  @OneToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'project_thresholds_project_exists' })
  project: Relation<Project>

  @Column('longtext', { transformer: jsonColumn<ThresholdSettings>() })
  settings: ThresholdSettings

  @Column('int')
  version: number
}
