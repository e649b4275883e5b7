import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { ScenarioInputs, ScenarioResult } from '../../../shared/contract/scenarios.js'
import type { SpectrumUsed } from '../../../shared/contract/spectra.js'
import type { OpticalModelName } from '../../../shared/physics/whatIf/index.js'
import { jsonColumn } from '../transformers.js'
import type { Device } from './Device.js'
import type { Project } from './Project.js'
import type { User } from './User.js'

/** A change of a device that somebody kept, with the numbers that the server computed and what they rest on. */
@Entity({ name: 'scenario' })
@Index('scenario_of_device', ['deviceId', 'deletedAt'])
export class Scenario {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  projectId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'scenario_project_exists' })
  project: Relation<Project>

  @Column('uuid')
  deviceId: string

  @ManyToOne('Device', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'deviceId', foreignKeyConstraintName: 'scenario_device_exists' })
  device: Relation<Device>

  @Column('varchar', { length: 120 })
  name: string

  @Column('varchar', { length: 1000 })
  reason: string

  @Column('varchar', { length: 20 })
  model: OpticalModelName

  @Column('longtext', { transformer: jsonColumn<Record<string, number>>() })
  change: Record<string, number>

  @Column('longtext', { transformer: jsonColumn<SpectrumUsed>() })
  spectrum: SpectrumUsed

  @Column('longtext', { transformer: jsonColumn<ScenarioResult>() })
  result: ScenarioResult

  @Column('longtext', { transformer: jsonColumn<ScenarioInputs>() })
  inputs: ScenarioInputs

  @Column('uuid')
  madeById: string

  @ManyToOne('User', { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'madeById', foreignKeyConstraintName: 'scenario_maker_exists' })
  madeBy: Relation<User>

  @Column('datetime', { precision: 3 })
  madeAt: Date

  @Column('int')
  version: number

  @Column('datetime', { precision: 3, nullable: true })
  deletedAt: Date | null
}
