import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { ReadingMapping } from '../../../shared/contract/scans.js'
import { jsonColumn } from '../transformers.js'
import type { Project } from './Project.js'

/** The mapping that was last confirmed in a project for files of one shape. */
@Entity({ name: 'reading_memory' })
export class ReadingMemory {
  @PrimaryColumn('uuid')
  projectId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'reading_memory_project_exists' })
  project: Relation<Project>

  /** SHA-256 of the shape that the reader gives a file, hexadecimal. */
  @PrimaryColumn('char', { length: 64 })
  shape: string

  @Column('longtext', { transformer: jsonColumn<ReadingMapping>() })
  mapping: ReadingMapping

  @Column('datetime', { precision: 3 })
  confirmedAt: Date
}
