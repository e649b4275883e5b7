import { v7 as uuid } from 'uuid'
import type { Config } from '../config.js'
import { addMail } from '../database/repositories/outbox.js'
import type { Work } from '../database/transaction.js'
import type { Message } from './messages.js'

/** Puts a mail into the outbox, in the transaction of what caused it. Without SMTP it is kept to be read there. */
export async function writeMail(work: Work, config: Config, message: Message): Promise<void> {
  const now = new Date()
  await addMail(work, {
    id: uuid(),
    ...message,
    state: config.smtpUrl ? 'waiting' : 'kept',
    attempts: 0,
    lastError: null,
    createdAt: now,
    nextAttemptAt: config.smtpUrl ? now : null,
    sentAt: null,
  })
}
