import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import {
  Conditions,
  type ReadingMapping,
  type ScanOrigin,
  type ScanQuantity,
  type ScanState,
} from '../../../shared/contract/scans.js'
import { float64Blob, jsonColumn, parsedJsonColumn } from '../transformers.js'
import type { BiasSeries } from './BiasSeries.js'
import type { Device } from './Device.js'
import type { Junction } from './Junction.js'
import type { Project } from './Project.js'
import type { SourceFile } from './SourceFile.js'
import type { User } from './User.js'

/** One curve of one device, made of a column of a source file; EQE and reflectance are fractions. */
@Entity({ name: 'scan' })
@Index('scan_newest_in_project', ['projectId', 'uploadedAt', 'id'])
@Index('scan_of_device', ['deviceId', 'quantity', 'junctionId'])
export class Scan {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  projectId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'scan_project_exists' })
  project: Relation<Project>

  @Column('uuid')
  deviceId: string

  @ManyToOne('Device', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'deviceId', foreignKeyConstraintName: 'scan_device_exists' })
  device: Relation<Device>

  /** Null for reflectance, and for an EQE scan whose junction was taken out of the device after the scan was deleted. */
  @Column('uuid', { nullable: true })
  junctionId: string | null

  @ManyToOne('Junction', { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'junctionId', foreignKeyConstraintName: 'scan_junction_exists' })
  junction: Relation<Junction> | null

  @Column('uuid')
  sourceFileId: string

  @ManyToOne('SourceFile', { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'sourceFileId', foreignKeyConstraintName: 'scan_source_file_exists' })
  sourceFile: Relation<SourceFile>

  /** Which column of the mapped table the values came from. */
  @Column('int')
  sourceColumn: number

  @Column('varchar', { length: 20 })
  quantity: ScanQuantity

  @Column('varchar', { length: 200 })
  label: string

  @Column('int')
  points: number

  @Column('double')
  firstNm: number

  @Column('double')
  lastNm: number

  @Column('mediumblob', { transformer: float64Blob })
  wavelengthNm: Float64Array

  @Column('mediumblob', { transformer: float64Blob })
  values: Float64Array

  @Column('longtext', { transformer: jsonColumn<ReadingMapping>() })
  mapping: ReadingMapping

  @Column('longtext', { transformer: parsedJsonColumn(Conditions) })
  conditions: Conditions

  @Column('varchar', { length: 20 })
  origin: ScanOrigin

  /** Of a corrected scan: what it was made of. */
  @Column('longtext', { transformer: jsonColumn<string[]>() })
  parentScanIds: string[]

  @Column('uuid', { nullable: true })
  biasSeriesId: string | null

  @ManyToOne('BiasSeries', { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'biasSeriesId', foreignKeyConstraintName: 'scan_bias_series_exists' })
  biasSeries: Relation<BiasSeries> | null

  @Column('varchar', { length: 20 })
  state: ScanState

  @Column('uuid', { nullable: true })
  decidedById: string | null

  @ManyToOne('User', { onDelete: 'RESTRICT', nullable: true })
  @JoinColumn({ name: 'decidedById', foreignKeyConstraintName: 'scan_decider_exists' })
  decidedBy: Relation<User> | null

  @Column('datetime', { precision: 3, nullable: true })
  decidedAt: Date | null

  @Column('varchar', { length: 1000 })
  decisionReason: string

  @Column('datetime', { precision: 3 })
  uploadedAt: Date

  @Column('uuid')
  uploadedById: string

  @ManyToOne('User', { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'uploadedById', foreignKeyConstraintName: 'scan_uploader_exists' })
  uploadedBy: Relation<User>

  @Column('int')
  version: number

  @Column('datetime', { precision: 3, nullable: true })
  deletedAt: Date | null
}
