import type { MigrationInterface, QueryRunner } from 'typeorm'

/** Accounts, sessions, projects with their members and invitations, mail and the audit trail. */
export class AccountsAndProjects1764590000000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    for (const table of TABLES) await runner.query(table)
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of [
      'audit_event',
      'outbox_mail',
      'invitation',
      'membership',
      'project',
      'password_reset',
      'session',
      '`user`',
    ])
      await runner.query(`DROP TABLE ${table}`)
  }
}

const TABLES = [
  `CREATE TABLE \`user\` (
     id uuid NOT NULL,
     name varchar(120) NOT NULL,
     email varchar(254) NOT NULL,
     passwordHash varchar(255) NULL,
     isAdministrator tinyint NOT NULL,
     disabled tinyint NOT NULL,
     createdAt datetime(3) NOT NULL,
     lastSignInAt datetime(3) NULL,
     PRIMARY KEY (id),
     UNIQUE INDEX user_email_unique (email)
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE session (
     id varchar(128) NOT NULL,
     userId uuid NULL,
     data text NOT NULL,
     client varchar(200) NOT NULL,
     startedAt datetime(3) NOT NULL,
     lastUsedAt datetime(3) NOT NULL,
     expiresAt datetime(3) NOT NULL,
     PRIMARY KEY (id),
     INDEX session_expiry (expiresAt),
     INDEX session_of_user (userId)
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE password_reset (
     tokenHash char(64) NOT NULL,
     userId uuid NOT NULL,
     createdAt datetime(3) NOT NULL,
     expiresAt datetime(3) NOT NULL,
     usedAt datetime(3) NULL,
     PRIMARY KEY (tokenHash),
     CONSTRAINT password_reset_user_exists FOREIGN KEY (userId) REFERENCES \`user\`(id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE project (
     id uuid NOT NULL,
     name varchar(120) NOT NULL,
     description text NOT NULL,
     archived tinyint NOT NULL,
     version int NOT NULL,
     createdAt datetime(3) NOT NULL,
     deletedAt datetime(3) NULL,
     PRIMARY KEY (id),
     INDEX project_deleted (deletedAt)
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE membership (
     projectId uuid NOT NULL,
     userId uuid NOT NULL,
     roles varchar(200) NOT NULL,
     since datetime(3) NOT NULL,
     PRIMARY KEY (projectId, userId),
     INDEX membership_of_user (userId),
     CONSTRAINT membership_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT membership_user_exists FOREIGN KEY (userId) REFERENCES \`user\`(id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE invitation (
     id uuid NOT NULL,
     projectId uuid NOT NULL,
     email varchar(254) NOT NULL,
     roles varchar(200) NOT NULL,
     tokenHash char(64) NOT NULL,
     invitedById uuid NOT NULL,
     createdAt datetime(3) NOT NULL,
     expiresAt datetime(3) NOT NULL,
     acceptedAt datetime(3) NULL,
     withdrawnAt datetime(3) NULL,
     PRIMARY KEY (id),
     UNIQUE INDEX invitation_token_unique (tokenHash),
     INDEX invitation_of_project (projectId, createdAt),
     CONSTRAINT invitation_project_exists FOREIGN KEY (projectId) REFERENCES project (id) ON DELETE CASCADE ON UPDATE NO ACTION,
     CONSTRAINT invitation_inviter_exists FOREIGN KEY (invitedById) REFERENCES \`user\`(id) ON DELETE CASCADE ON UPDATE NO ACTION
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE outbox_mail (
     id uuid NOT NULL,
     recipient varchar(254) NOT NULL,
     subject varchar(300) NOT NULL,
     text text NOT NULL,
     kind varchar(60) NOT NULL,
     state varchar(10) NOT NULL,
     attempts int NOT NULL,
     lastError varchar(500) NULL,
     createdAt datetime(3) NOT NULL,
     nextAttemptAt datetime(3) NULL,
     sentAt datetime(3) NULL,
     PRIMARY KEY (id),
     INDEX outbox_mail_created (createdAt),
     INDEX outbox_mail_due (state, nextAttemptAt)
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  `CREATE TABLE audit_event (
     id uuid NOT NULL,
     at datetime(3) NOT NULL,
     actorId uuid NULL,
     actorName varchar(120) NULL,
     projectId uuid NULL,
     action varchar(80) NOT NULL,
     sentence varchar(1000) NOT NULL,
     subjectKind varchar(40) NULL,
     subjectId varchar(64) NULL,
     subjectName varchar(200) NULL,
     PRIMARY KEY (id),
     INDEX audit_event_at (at),
     INDEX audit_event_of_project (projectId, at)
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
]
