import { Column, Entity, Index, JoinColumn, ManyToOne, OneToMany, PrimaryColumn, type Relation } from 'typeorm'
import type { Terminals } from '../../../shared/contract/devices.js'
import type { Junction } from './Junction.js'
import type { Layer } from './Layer.js'
import type { Project } from './Project.js'

/** One sample: what it is called, how its junctions are wired, its stack from the sunward side. */
@Entity({ name: 'device' })
@Index('device_project', ['projectId', 'deletedAt'])
export class Device {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  projectId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'device_project_exists' })
  project: Relation<Project>

  @Column('varchar', { length: 120 })
  name: string

  @Column('varchar', { length: 200 })
  sampleId: string

  @Column('text')
  description: string

  @Column('varchar', { length: 200 })
  series: string

  @Column('double', { nullable: true })
  apertureAreaCm2: number | null

  @Column('double', { nullable: true })
  deviceAreaCm2: number | null

  @Column('varchar', { length: 20 })
  terminals: Terminals

  @Column('int')
  version: number

  @Column('datetime', { precision: 3 })
  createdAt: Date

  @Column('datetime', { precision: 3 })
  updatedAt: Date

  @Column('datetime', { precision: 3, nullable: true })
  deletedAt: Date | null

  @OneToMany('Junction', 'device')
  junctions: Relation<Junction[]>

  @OneToMany('Layer', 'device')
  layers: Relation<Layer[]>
}
