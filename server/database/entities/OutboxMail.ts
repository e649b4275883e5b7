import { Column, Entity, Index, PrimaryColumn } from 'typeorm'

/** A mail, written in the transaction of what caused it; sent afterwards, or kept to be read where no SMTP is set. */
@Entity({ name: 'outbox_mail' })
@Index('outbox_mail_due', ['state', 'nextAttemptAt'])
@Index('outbox_mail_created', ['createdAt'])
export class OutboxMail {
  @PrimaryColumn('uuid')
  id: string

  @Column('varchar', { length: 254 })
  recipient: string

  @Column('varchar', { length: 300 })
  subject: string

  @Column('text')
  text: string

  @Column('varchar', { length: 60 })
  kind: string

  @Column('varchar', { length: 10 })
  state: 'kept' | 'waiting' | 'sent' | 'failed'

  @Column('int')
  attempts: number

  @Column('varchar', { length: 500, nullable: true })
  lastError: string | null

  @Column('datetime', { precision: 3 })
  createdAt: Date

  @Column('datetime', { precision: 3, nullable: true })
  nextAttemptAt: Date | null

  @Column('datetime', { precision: 3, nullable: true })
  sentAt: Date | null
}
