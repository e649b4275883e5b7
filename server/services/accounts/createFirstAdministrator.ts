import { v7 as uuid } from 'uuid'
import { ApiError } from '../../../shared/contract/errors.js'
import { addUser, lockInstallation, numberOfUsers } from '../../database/repositories/users.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { hashPassword } from '../passwords.js'
import { actorOf } from './signIn.js'

/** Only on an installation without people; two at once end in one administrator. */
export async function createFirstAdministrator(
  database: Database,
  input: { name: string; email: string; password: string },
): Promise<Actor> {
  const passwordHash = await hashPassword(input.password)
  return database.transaction(async (work) => {
    await lockInstallation(work)
    if ((await numberOfUsers(work)) > 0)
      throw new ApiError(
        'STATE_CONFLICT',
        { reason: 'installed' },
        'This installation has people already; ask its administrator for an account.',
      )
    const user = {
      id: uuid(),
      name: input.name,
      email: input.email,
      passwordHash,
      isAdministrator: true,
      disabled: false,
      createdAt: new Date(),
      lastSignInAt: new Date(),
    }
    await addUser(work, user)
    const actor = actorOf(user)
    await recordAudit(work, {
      actor,
      action: 'installation.begun',
      sentence: `${user.name} became the first administrator.`,
      subject: { kind: 'person', id: user.id, name: user.name },
    })
    return actor
  })
}
