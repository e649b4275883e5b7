import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { User } from './User.js'

/** A link to set a password; only the hash of its token is kept, and it works once. */
@Entity({ name: 'password_reset' })
export class PasswordReset {
  @PrimaryColumn('char', { length: 64 })
  tokenHash: string

  @Column('uuid')
  userId: string

  @ManyToOne('User', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'userId', foreignKeyConstraintName: 'password_reset_user_exists' })
  user: Relation<User>

  @Column('datetime', { precision: 3 })
  createdAt: Date

  @Column('datetime', { precision: 3 })
  expiresAt: Date

  @Column('datetime', { precision: 3, nullable: true })
  usedAt: Date | null
}
