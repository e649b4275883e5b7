import type { ActiveSession, Person } from '../../../shared/contract/account.js'
import { ApiError } from '../../../shared/contract/errors.js'
import { deleteSession, deleteSessionsOfUser, sessionsOfUser } from '../../database/repositories/sessions.js'
import { saveUser, userById } from '../../database/repositories/users.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { hashPassword, isPassword } from '../passwords.js'
import { publicSessionId } from './publicSessionId.js'
import { presentPerson } from './describeSession.js'
import { actorOf } from './signIn.js'

export async function updateAccount(database: Database, actor: Actor, name: string): Promise<Person> {
  return database.transaction(async (work) => {
    const user = await requireUser(work, actor)
    const renamed = { ...user, name }
    await saveUser(work, renamed)
    await recordAudit(work, {
      actor,
      action: 'person.renamed',
      sentence: `${user.name} is now called ${name}.`,
      subject: { kind: 'person', id: user.id, name },
    })
    return presentPerson(actorOf(renamed))
  })
}

/** Every other session of the person ends. */
export async function changePassword(
  database: Database,
  actor: Actor,
  sessionId: string,
  input: { currentPassword: string; newPassword: string },
): Promise<void> {
  const passwordHash = await hashPassword(input.newPassword)
  await database.transaction(async (work) => {
    const user = await requireUser(work, actor)
    if (!(await isPassword(user.passwordHash, input.currentPassword)))
      throw new ApiError('PASSWORD_WRONG', {}, 'The current password is not right.')
    await saveUser(work, { ...user, passwordHash })
    await deleteSessionsOfUser(work, user.id, sessionId)
    await recordAudit(work, {
      actor,
      action: 'password.changed',
      sentence: `${user.name} changed the password.`,
      subject: { kind: 'person', id: user.id, name: user.name },
    })
  })
}

export async function listSessions(database: Database, actor: Actor, sessionId: string): Promise<ActiveSession[]> {
  const records = await sessionsOfUser(database.work, actor.personId, new Date())
  return records.map((record) => ({
    id: publicSessionId(record.id),
    current: record.id === sessionId,
    startedAt: record.startedAt.toISOString(),
    lastUsedAt: record.lastUsedAt.toISOString(),
    client: record.client,
  }))
}

export async function endSession(database: Database, actor: Actor, publicId: string): Promise<void> {
  const records = await sessionsOfUser(database.work, actor.personId, new Date())
  const record = records.find((one) => publicSessionId(one.id) === publicId)
  if (!record) throw new ApiError('NOT_FOUND', { what: 'session' }, 'There is no such session of yours.')
  await deleteSession(database.work, record.id)
}

async function requireUser(work: Database['work'], actor: Actor) {
  const user = await userById(work, actor.personId)
  if (!user) throw new ApiError('SIGN_IN_NEEDED', {}, 'This account is no longer there.')
  return user
}
