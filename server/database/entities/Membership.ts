import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Role } from '../../../shared/contract/rights.js'
import { jsonColumn } from '../transformers.js'
import type { Project } from './Project.js'
import type { User } from './User.js'

/** A person in a project, with one or more roles. */
@Entity({ name: 'membership' })
@Index('membership_of_user', ['userId'])
export class Membership {
  @PrimaryColumn('uuid')
  projectId: string

  @PrimaryColumn('uuid')
  userId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'membership_project_exists' })
  project: Relation<Project>

  @ManyToOne('User', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'userId', foreignKeyConstraintName: 'membership_user_exists' })
  user: Relation<User>

  @Column('varchar', { length: 200, transformer: jsonColumn<Role[]>() })
  roles: Role[]

  @Column('datetime', { precision: 3 })
  since: Date
}
