import nodemailer from 'nodemailer'
import type { Logger } from 'pino'
import type { Config } from '../config.js'
import { claimDueMail, noteFailure, noteSent } from '../database/repositories/outbox.js'
import type { Database } from '../database/transaction.js'

const ATTEMPTS = 12
const FIRST_DELAY_MS = 15_000
const LONGEST_DELAY_MS = 3_600_000
/** A claimed mail that was neither sent nor failed in this time belonged to a server that died. */
const CLAIM_MS = 120_000
const AT_ONCE = 20

/**
 * Sends what waits in the outbox. Each mail is claimed first, so that of two servers only one sends it; a failure is
 * tried again later and later. Gives the number of mails sent.
 */
export async function sendDueMail(parts: { config: Config; database: Database; log: Logger }): Promise<number> {
  const { config, database, log } = parts
  if (!config.smtpUrl) return 0
  const now = new Date()
  const due = await database.transaction((work) => claimDueMail(work, now, new Date(now.getTime() + CLAIM_MS), AT_ONCE))
  if (due.length === 0) return 0
  const transport = nodemailer.createTransport(config.smtpUrl)
  let sent = 0
  try {
    for (const mail of due) {
      try {
        await transport.sendMail({
          from: config.mailFrom,
          to: mail.recipient,
          subject: mail.subject,
          text: mail.text,
          messageId: `<${mail.id}@tierlight>`,
        })
        await noteSent(database.work, mail.id, new Date())
        sent++
      } catch (error) {
        const attempts = mail.attempts + 1
        const delay = Math.min(LONGEST_DELAY_MS, FIRST_DELAY_MS * 2 ** (attempts - 1))
        const words = error instanceof Error ? error.message : String(error)
        log.warn({ mail: mail.id, attempts, err: error }, 'mail could not be sent')
        await noteFailure(database.work, mail.id, {
          attempts,
          lastError: words.slice(0, 500),
          state: attempts >= ATTEMPTS ? 'failed' : 'waiting',
          nextAttemptAt: new Date(Date.now() + delay),
        })
      }
    }
  } finally {
    transport.close()
  }
  return sent
}
