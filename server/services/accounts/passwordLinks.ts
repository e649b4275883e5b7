import { ApiError } from '../../../shared/contract/errors.js'
import type { User } from '../../database/entities/User.js'
import { addPasswordReset, closePasswordResets, openPasswordReset } from '../../database/repositories/passwordResets.js'
import { deleteSessionsOfUser } from '../../database/repositories/sessions.js'
import { saveUser, userByEmail, userById } from '../../database/repositories/users.js'
import type { Work } from '../../database/transaction.js'
import { accountMessage, passwordResetMessage } from '../../mail/messages.js'
import { writeMail } from '../../mail/outbox.js'
import { recordAudit } from '../audit.js'
import type { Context } from '../context.js'
import { hashPassword } from '../passwords.js'
import { hashToken, newToken } from '../tokens.js'

const RESET_HOURS = 2
const ACCOUNT_HOURS = 72

/** Writes the mail with a reset link when the address is known; tells nobody whether it was. */
export async function requestPasswordReset({ database, config }: Context, email: string): Promise<void> {
  await database.transaction(async (work) => {
    const user = await userByEmail(work, email)
    if (!user || user.disabled) return
    const link = await makeLink(work, config.publicUrl, user, RESET_HOURS)
    await writeMail(
      work,
      config,
      passwordResetMessage({ recipient: user.email, name: user.name, link, validHours: RESET_HOURS }),
    )
    await recordAudit(work, {
      actor: null,
      action: 'password.reset-requested',
      sentence: `A password reset was asked for ${user.name}.`,
      subject: { kind: 'person', id: user.id, name: user.name },
    })
  })
}

/** The mail of a new account: its link sets the first password. */
export async function sendAccountLink(work: Work, config: Context['config'], user: User): Promise<void> {
  const link = await makeLink(work, config.publicUrl, user, ACCOUNT_HOURS)
  await writeMail(
    work,
    config,
    accountMessage({ recipient: user.email, name: user.name, link, validHours: ACCOUNT_HOURS }),
  )
}

/** Sets the password of a link; the link is used up and every session of the person ends. */
export async function resetPassword({ database }: Context, token: string, newPassword: string): Promise<void> {
  const passwordHash = await hashPassword(newPassword)
  await database.transaction(async (work) => {
    const now = new Date()
    const reset = await openPasswordReset(work, hashToken(token), now)
    const user = reset && (await userById(work, reset.userId))
    if (!user || user.disabled)
      throw new ApiError(
        'LINK_EXPIRED',
        { what: 'password reset' },
        'This link was used already or has expired. Ask for a new one.',
      )
    await saveUser(work, { ...user, passwordHash })
    await closePasswordResets(work, user.id, now)
    await deleteSessionsOfUser(work, user.id)
    await recordAudit(work, {
      actor: { personId: user.id, name: user.name },
      action: 'password.reset',
      sentence: `${user.name} set a new password by a link.`,
      subject: { kind: 'person', id: user.id, name: user.name },
    })
  })
}

async function makeLink(work: Work, publicUrl: string, user: User, validHours: number): Promise<string> {
  const { token, tokenHash } = newToken()
  const now = new Date()
  await addPasswordReset(work, {
    tokenHash,
    userId: user.id,
    createdAt: now,
    expiresAt: new Date(now.getTime() + validHours * 3_600_000),
  })
  return `${publicUrl}/reset-password/${token}`
}
