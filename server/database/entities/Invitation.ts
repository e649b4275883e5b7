import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Role } from '../../../shared/contract/rights.js'
import { jsonColumn } from '../transformers.js'
import type { Project } from './Project.js'
import type { User } from './User.js'

/** An invitation by mail; only the hash of its token is kept. */
@Entity({ name: 'invitation' })
@Index('invitation_token_unique', ['tokenHash'], { unique: true })
@Index('invitation_of_project', ['projectId', 'createdAt'])
export class Invitation {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  projectId: string

  @ManyToOne('Project', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'invitation_project_exists' })
  project: Relation<Project>

  @Column('varchar', { length: 254 })
  email: string

  @Column('varchar', { length: 200, transformer: jsonColumn<Role[]>() })
  roles: Role[]

  @Column('char', { length: 64 })
  tokenHash: string

  @Column('uuid')
  invitedById: string

  @ManyToOne('User', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'invitedById', foreignKeyConstraintName: 'invitation_inviter_exists' })
  invitedBy: Relation<User>

  @Column('datetime', { precision: 3 })
  createdAt: Date

  @Column('datetime', { precision: 3 })
  expiresAt: Date

  @Column('datetime', { precision: 3, nullable: true })
  acceptedAt: Date | null

  @Column('datetime', { precision: 3, nullable: true })
  withdrawnAt: Date | null
}
