import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Project } from './Project.js'
import type { User } from './User.js'

/** An uploaded file, byte for byte. The same bytes are kept once in a project. */
@Entity({ name: 'source_file' })
@Index('source_file_bytes_in_project', ['projectId', 'sha256'], { unique: true })
@Index('source_file_newest', ['projectId', 'uploadedAt', 'id'])
export class SourceFile {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  projectId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'source_file_project_exists' })
  project: Relation<Project>

  @Column('varchar', { length: 255 })
  name: string

  @Column('int')
  sizeBytes: number

  @Column('char', { length: 64 })
  sha256: string

  /** Left out of every query that does not ask for it by name. */
  @Column('longblob', { select: false })
  bytes: Buffer

  @Column('varchar', { length: 20 })
  state: 'uploaded' | 'read'

  @Column('datetime', { precision: 3 })
  uploadedAt: Date

  @Column('uuid')
  uploadedById: string

  @ManyToOne('User', { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'uploadedById', foreignKeyConstraintName: 'source_file_uploader_exists' })
  uploadedBy: Relation<User>
}
