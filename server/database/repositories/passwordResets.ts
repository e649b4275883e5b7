import { IsNull, MoreThan } from 'typeorm'
import { PasswordReset } from '../entities/PasswordReset.js'
import type { Work } from '../transaction.js'

export async function addPasswordReset(
  work: Work,
  reset: Pick<PasswordReset, 'tokenHash' | 'userId' | 'createdAt' | 'expiresAt'>,
): Promise<void> {
  await work.insert(PasswordReset, { ...reset, usedAt: null })
}

/** A link that still works, locked so that it works once. */
export function openPasswordReset(work: Work, tokenHash: string, now: Date): Promise<PasswordReset | null> {
  return work.findOne(PasswordReset, {
    where: { tokenHash, usedAt: IsNull(), expiresAt: MoreThan(now) },
    lock: { mode: 'pessimistic_write' },
  })
}

/** Uses up every open link of the person. */
export async function closePasswordResets(work: Work, userId: string, at: Date): Promise<void> {
  await work.update(PasswordReset, { userId, usedAt: IsNull() }, { usedAt: at })
}
