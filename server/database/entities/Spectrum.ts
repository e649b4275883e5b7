import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { ReadingMapping } from '../../../shared/contract/scans.js'
import { float64Blob, jsonColumn } from '../transformers.js'
import type { Project } from './Project.js'
import type { SourceFile } from './SourceFile.js'
import type { User } from './User.js'

/** A spectrum that a project uploaded, W m⁻² nm⁻¹. */
@Entity({ name: 'spectrum' })
@Index('spectrum_name_in_project', ['projectId', 'name'], { unique: true })
export class Spectrum {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  projectId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'spectrum_project_exists' })
  project: Relation<Project>

  @Column('varchar', { length: 120 })
  name: string

  @Column('uuid')
  sourceFileId: string

  @ManyToOne('SourceFile', { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'sourceFileId', foreignKeyConstraintName: 'spectrum_source_file_exists' })
  sourceFile: Relation<SourceFile>

  @Column('longtext', { transformer: jsonColumn<ReadingMapping>() })
  mapping: ReadingMapping

  @Column('int')
  points: number

  @Column('mediumblob', { transformer: float64Blob })
  wavelengthNm: Float64Array

  @Column('mediumblob', { transformer: float64Blob })
  values: Float64Array

  @Column('double')
  totalIrradianceWM2: number

  @Column('datetime', { precision: 3 })
  uploadedAt: Date

  @Column('uuid')
  uploadedById: string

  @ManyToOne('User', { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'uploadedById', foreignKeyConstraintName: 'spectrum_uploader_exists' })
  uploadedBy: Relation<User>
}
