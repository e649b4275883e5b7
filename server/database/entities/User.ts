import { Column, Entity, Index, PrimaryColumn } from 'typeorm'

/** A person with an account. */
@Entity({ name: 'user' })
@Index('user_email_unique', ['email'], { unique: true })
export class User {
  @PrimaryColumn('uuid')
  id: string

  @Column('varchar', { length: 120 })
  name: string

  /** Lower case. */
  @Column('varchar', { length: 254 })
  email: string

  /** Argon2id; null until the person has set a password. */
  @Column('varchar', { length: 255, nullable: true })
  passwordHash: string | null

  @Column('boolean')
  isAdministrator: boolean

  @Column('boolean')
  disabled: boolean

  @Column('datetime', { precision: 3 })
  createdAt: Date

  @Column('datetime', { precision: 3, nullable: true })
  lastSignInAt: Date | null
}
