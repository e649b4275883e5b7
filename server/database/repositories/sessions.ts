import { LessThan, MoreThan, Not } from 'typeorm'
import { SessionRecord } from '../entities/SessionRecord.js'
import type { Work } from '../transaction.js'

export interface SessionToSave {
  id: string
  userId: string | null
  data: string
  client: string
  at: Date
  expiresAt: Date
}

export function readSession(work: Work, id: string, now: Date): Promise<SessionRecord | null> {
  return work.findOneBy(SessionRecord, { id, expiresAt: MoreThan(now) })
}

export async function saveSession(work: Work, session: SessionToSave): Promise<void> {
  const { at, ...row } = session
  await work
    .createQueryBuilder()
    .insert()
    .into(SessionRecord)
    .values({ ...row, startedAt: at, lastUsedAt: at })
    .orUpdate(['userId', 'data', 'client', 'lastUsedAt', 'expiresAt'], ['id'])
    .execute()
}

export async function touchSession(work: Work, id: string, at: Date, expiresAt: Date): Promise<void> {
  await work.update(SessionRecord, { id }, { lastUsedAt: at, expiresAt })
}

export async function deleteSession(work: Work, id: string): Promise<void> {
  await work.delete(SessionRecord, { id })
}

export function sessionsOfUser(work: Work, userId: string, now: Date): Promise<SessionRecord[]> {
  return work.find(SessionRecord, { where: { userId, expiresAt: MoreThan(now) }, order: { lastUsedAt: 'DESC' } })
}

export async function deleteSessionsOfUser(work: Work, userId: string, exceptId = ''): Promise<void> {
  await work.delete(SessionRecord, { userId, id: Not(exceptId) })
}

export async function deleteExpiredSessions(work: Work, now: Date): Promise<void> {
  await work.delete(SessionRecord, { expiresAt: LessThan(now) })
}
