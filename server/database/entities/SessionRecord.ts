import { Column, Entity, Index, PrimaryColumn } from 'typeorm'

/** One browser session; `data` is what the session middleware keeps. */
@Entity({ name: 'session' })
@Index('session_of_user', ['userId'])
@Index('session_expiry', ['expiresAt'])
export class SessionRecord {
  @PrimaryColumn('varchar', { length: 128 })
  id: string

  @Column('uuid', { nullable: true })
  userId: string | null

  @Column('text')
  data: string

  @Column('varchar', { length: 200 })
  client: string

  @Column('datetime', { precision: 3 })
  startedAt: Date

  @Column('datetime', { precision: 3 })
  lastUsedAt: Date

  @Column('datetime', { precision: 3 })
  expiresAt: Date
}
