import { Column, Entity, Index, PrimaryColumn } from 'typeorm'

/** A group's shared workspace. */
@Entity({ name: 'project' })
@Index('project_deleted', ['deletedAt'])
export class Project {
  @PrimaryColumn('uuid')
  id: string

  @Column('varchar', { length: 120 })
  name: string

  @Column('text')
  description: string

  @Column('boolean')
  archived: boolean

  @Column('int')
  version: number

  @Column('datetime', { precision: 3 })
  createdAt: Date

  @Column('datetime', { precision: 3, nullable: true })
  deletedAt: Date | null
}
