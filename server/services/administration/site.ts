import type { Health, OutboxMail as OutboxMailReply } from '../../../shared/contract/administration.js'
import type { Page, PageQuery } from '../../../shared/contract/primitives.js'
import { ENGINE_VERSION } from '../../../shared/physics/version.js'
import { databaseState, storageState } from '../../database/repositories/site.js'
import { mailCounts, mailNewestFirst } from '../../database/repositories/outbox.js'
import type { Database } from '../../database/transaction.js'
import { PRODUCT_VERSION } from '../../version.js'
import { requireAdministrator, type Actor } from '../actor.js'
import type { Context } from '../context.js'
import { cursorAfter, timePosition } from '../cursor.js'

const STARTED_AT = new Date()

export async function listOutbox({ work }: Database, actor: Actor, query: PageQuery): Promise<Page<OutboxMailReply>> {
  requireAdministrator(actor)
  const { mails, total } = await mailNewestFirst(work, timePosition(query.cursor), query.limit)
  return {
    items: mails.map((mail) => ({
      id: mail.id,
      to: mail.recipient,
      subject: mail.subject,
      text: mail.text,
      kind: mail.kind,
      createdAt: mail.createdAt.toISOString(),
      state: mail.state,
      attempts: mail.attempts,
      lastError: mail.lastError,
      sentAt: mail.sentAt?.toISOString() ?? null,
    })),
    total,
    nextCursor: cursorAfter(mails, query.limit, ({ createdAt, id }) => ({ at: createdAt, id })),
  }
}

export async function readHealth({ database, config }: Context, actor: Actor): Promise<Health> {
  requireAdministrator(actor)
  return {
    version: PRODUCT_VERSION,
    engineVersion: ENGINE_VERSION,
    startedAt: STARTED_AT.toISOString(),
    database: await databaseState(database.work),
    mail: { delivery: config.smtpUrl ? 'smtp' : 'outbox', ...(await mailCounts(database.work)) },
    storage: await storageState(database.work),
  }
}
