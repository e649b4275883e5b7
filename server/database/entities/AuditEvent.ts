import { Column, Entity, Index, PrimaryColumn } from 'typeorm'

/** Who did what, when; rows are only ever added. Names are kept as they were, so that the trail outlives people. */
@Entity({ name: 'audit_event' })
@Index('audit_event_of_project', ['projectId', 'at'])
@Index('audit_event_at', ['at'])
export class AuditEvent {
  @PrimaryColumn('uuid')
  id: string

  @Column('datetime', { precision: 3 })
  at: Date

  @Column('uuid', { nullable: true })
  actorId: string | null

  @Column('varchar', { length: 120, nullable: true })
  actorName: string | null

  @Column('uuid', { nullable: true })
  projectId: string | null

  /** Plain dotted name, for example scan.accepted. */
  @Column('varchar', { length: 80 })
  action: string

  @Column('varchar', { length: 1000 })
  sentence: string

  @Column('varchar', { length: 40, nullable: true })
  subjectKind: string | null

  @Column('varchar', { length: 64, nullable: true })
  subjectId: string | null

  @Column('varchar', { length: 200, nullable: true })
  subjectName: string | null
}
