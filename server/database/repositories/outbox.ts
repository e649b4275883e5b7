import { In } from 'typeorm'
import { OutboxMail } from '../entities/OutboxMail.js'
import type { Work } from '../transaction.js'
import type { TimePosition } from './position.js'

export async function addMail(work: Work, mail: OutboxMail): Promise<void> {
  await work.insert(OutboxMail, mail)
}

/** Mail whose time has come, marked as taken until `claimedUntil`; rows that another server holds are passed over. */
export async function claimDueMail(work: Work, now: Date, claimedUntil: Date, limit: number): Promise<OutboxMail[]> {
  const due = await work
    .createQueryBuilder(OutboxMail, 'mail')
    .where("mail.state = 'waiting' AND mail.nextAttemptAt <= :now", { now })
    .orderBy('mail.nextAttemptAt')
    .take(limit)
    .setLock('pessimistic_write')
    .setOnLocked('skip_locked')
    .getMany()
  if (due.length > 0)
    await work.update(OutboxMail, { id: In(due.map((mail) => mail.id)) }, { nextAttemptAt: claimedUntil })
  return due
}

export async function noteSent(work: Work, id: string, at: Date): Promise<void> {
  await work.update(OutboxMail, { id }, { state: 'sent', sentAt: at, lastError: null, nextAttemptAt: null })
}

export async function noteFailure(
  work: Work,
  id: string,
  failure: Pick<OutboxMail, 'attempts' | 'lastError' | 'state' | 'nextAttemptAt'>,
): Promise<void> {
  await work.update(OutboxMail, { id }, failure)
}

export async function mailNewestFirst(
  work: Work,
  after: TimePosition | null,
  limit: number,
): Promise<{ mails: OutboxMail[]; total: number }> {
  const query = work
    .createQueryBuilder(OutboxMail, 'mail')
    .orderBy('mail.createdAt', 'DESC')
    .addOrderBy('mail.id', 'DESC')
    .take(limit)
  if (after) query.where('(mail.createdAt < :at OR (mail.createdAt = :at AND mail.id < :id))', after)
  return { mails: await query.getMany(), total: await work.count(OutboxMail) }
}

export async function mailCounts(work: Work): Promise<{ waiting: number; failed: number }> {
  return {
    waiting: await work.countBy(OutboxMail, { state: 'waiting' }),
    failed: await work.countBy(OutboxMail, { state: 'failed' }),
  }
}
