import { z } from 'zod'
import { EmailAddress, Id, Name, PageQuery, Timestamp, pageOf } from './primitives.js'
import { Activity, ActivityQuery } from './projects.js'
import { defineRoute } from './route.js'

export const Account = z
  .object({
    id: Id,
    name: z.string(),
    email: z.string(),
    isAdministrator: z.boolean(),
    disabled: z.boolean(),
    createdAt: Timestamp,
    lastSignInAt: Timestamp.nullable(),
    projectCount: z.int(),
  })
  .meta({ id: 'Account' })
export type Account = z.infer<typeof Account>

export const OutboxMail = z
  .object({
    id: Id,
    to: z.string(),
    subject: z.string(),
    text: z.string(),
    kind: z.string(),
    createdAt: Timestamp,
    state: z.enum(['kept', 'waiting', 'sent', 'failed']).meta({
      description: 'kept: no SMTP server is configured, so the mail can be read here',
    }),
    attempts: z.int(),
    lastError: z.string().nullable(),
    sentAt: Timestamp.nullable(),
  })
  .meta({ id: 'OutboxMail' })
export type OutboxMail = z.infer<typeof OutboxMail>

export const Health = z
  .object({
    version: z.string(),
    engineVersion: z.string(),
    startedAt: Timestamp,
    database: z.object({ answers: z.boolean(), version: z.string(), roundTripMs: z.number(), migrations: z.int() }),
    mail: z.object({ delivery: z.enum(['smtp', 'outbox']), waiting: z.int(), failed: z.int() }),
    storage: z.object({ sourceFiles: z.int(), sourceFileBytes: z.int(), scans: z.int() }),
  })
  .meta({ id: 'Health' })
export type Health = z.infer<typeof Health>

const group = 'Administration'

export const listAccounts = defineRoute({
  id: 'listAccounts',
  method: 'get',
  path: '/api/administration/accounts',
  group,
  summary: 'Everyone with an account',
  access: 'administrator',
  query: PageQuery,
  reply: pageOf(Account),
})

export const createAccount = defineRoute({
  id: 'createAccount',
  method: 'post',
  path: '/api/administration/accounts',
  group,
  summary: 'Make an account; the person gets a mail with a link to set a password',
  access: 'administrator',
  body: z.strictObject({ name: Name, email: EmailAddress, isAdministrator: z.boolean().default(false) }),
  reply: Account,
  status: 201,
})

export const updateAccountByAdministrator = defineRoute({
  id: 'updateAccountByAdministrator',
  method: 'patch',
  path: '/api/administration/accounts/:personId',
  group,
  summary: 'Disable, enable, or change the site role; the last administrator stays',
  access: 'administrator',
  params: z.object({ personId: Id }),
  body: z.strictObject({ disabled: z.boolean().optional(), isAdministrator: z.boolean().optional() }),
  reply: Account,
})

export const listOutbox = defineRoute({
  id: 'listOutbox',
  method: 'get',
  path: '/api/administration/outbox',
  group,
  summary: 'Mail that was written, newest first',
  access: 'administrator',
  query: PageQuery,
  reply: pageOf(OutboxMail),
})

export const readHealth = defineRoute({
  id: 'readHealth',
  method: 'get',
  path: '/api/administration/health',
  group,
  summary: 'Whether database, mail and storage are well',
  access: 'administrator',
  reply: Health,
})

export const listAuditEvents = defineRoute({
  id: 'listAuditEvents',
  method: 'get',
  path: '/api/administration/audit-events',
  group,
  summary: 'The audit trail of the site, newest first',
  access: 'administrator',
  query: ActivityQuery,
  reply: pageOf(Activity),
})
