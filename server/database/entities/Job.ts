import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Job as JobReply } from '../../../shared/contract/jobs.js'
import type { Project } from './Project.js'
import type { User } from './User.js'

/** Work that takes longer than a request. A server that runs it holds a lease, so that no other runs it too. */
@Entity({ name: 'job' })
@Index('job_due', ['state', 'leaseUntil'])
@Index('job_newest_in_project', ['projectId', 'createdAt'])
export class Job {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  projectId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'job_project_exists' })
  project: Relation<Project>

  @Column('varchar', { length: 40 })
  kind: JobReply['kind']

  @Column('varchar', { length: 20 })
  state: JobReply['state']

  @Column('int')
  done: number

  @Column('int')
  total: number

  @Column('varchar', { length: 1000 })
  message: string

  /** Which run holds the job. */
  @Column('uuid', { nullable: true })
  runId: string | null

  @Column('datetime', { precision: 3, nullable: true })
  leaseUntil: Date | null

  @Column('uuid', { nullable: true })
  requestedById: string | null

  @ManyToOne('User', { onDelete: 'RESTRICT', nullable: true })
  @JoinColumn({ name: 'requestedById', foreignKeyConstraintName: 'job_requester_exists' })
  requestedBy: Relation<User> | null

  @Column('datetime', { precision: 3 })
  createdAt: Date

  @Column('datetime', { precision: 3, nullable: true })
  endedAt: Date | null
}
