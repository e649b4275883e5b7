import { v7 as uuid } from 'uuid'
import type { Account } from '../../../shared/contract/administration.js'
import { ApiError } from '../../../shared/contract/errors.js'
import type { Page, PageQuery } from '../../../shared/contract/primitives.js'
import type { User } from '../../database/entities/User.js'
import { projectCountOf } from '../../database/repositories/projects.js'
import { deleteSessionsOfUser } from '../../database/repositories/sessions.js'
import {
  activeAdministrators,
  addUser,
  saveUser,
  userByEmail,
  userById,
  usersByName,
} from '../../database/repositories/users.js'
import type { Database } from '../../database/transaction.js'
import { sendAccountLink } from '../accounts/passwordLinks.js'
import { requireAdministrator, type Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import type { Context } from '../context.js'
import { cursorAfter, namePosition } from '../cursor.js'

export async function listAccounts({ work }: Database, actor: Actor, query: PageQuery): Promise<Page<Account>> {
  requireAdministrator(actor)
  const { users, total } = await usersByName(work, namePosition(query.cursor), query.limit)
  const projects = await projectCountOf(
    work,
    users.map((user) => user.id),
  )
  return {
    items: users.map((user) => presentAccount(user, projects.get(user.id) ?? 0)),
    total,
    nextCursor: cursorAfter(users, query.limit, ({ name, id }) => ({ name, id })),
  }
}

/** The person sets the password by a link in a mail; nobody else ever knows it. */
export async function createAccount(
  { database, config }: Context,
  actor: Actor,
  input: { name: string; email: string; isAdministrator: boolean },
): Promise<Account> {
  requireAdministrator(actor)
  return database.transaction(async (work) => {
    if (await userByEmail(work, input.email))
      throw new ApiError(
        'ALREADY_EXISTS',
        { what: 'account', field: 'email', value: input.email },
        `There is an account for ${input.email} already.`,
      )
    const user: User = {
      id: uuid(),
      ...input,
      passwordHash: null,
      disabled: false,
      createdAt: new Date(),
      lastSignInAt: null,
    }
    await addUser(work, user)
    await sendAccountLink(work, config, user)
    await recordAudit(work, {
      actor,
      action: 'account.created',
      sentence: `${actor.name} made an account for ${user.name}${user.isAdministrator ? ', an administrator' : ''}.`,
      subject: { kind: 'person', id: user.id, name: user.name },
    })
    return presentAccount(user, 0)
  })
}

/** Disabling ends the person's sessions; what they did stays. */
export async function updateAccount(
  database: Database,
  actor: Actor,
  personId: string,
  change: { disabled?: boolean | undefined; isAdministrator?: boolean | undefined },
): Promise<Account> {
  requireAdministrator(actor)
  return database.transaction(async (work) => {
    const administrators = await activeAdministrators(work)
    const user = await userById(work, personId)
    if (!user) throw new ApiError('NOT_FOUND', { what: 'account' }, 'There is no such account.')
    const changed = {
      ...user,
      disabled: change.disabled ?? user.disabled,
      isAdministrator: change.isAdministrator ?? user.isAdministrator,
    }
    const leaves = changed.disabled || !changed.isAdministrator
    if (leaves && administrators.every((one) => one.id === user.id) && administrators.length > 0)
      throw new ApiError(
        'STATE_CONFLICT',
        { reason: 'last-administrator' },
        'This is the only administrator. Make somebody else one first.',
      )
    await saveUser(work, changed)
    if (changed.disabled) await deleteSessionsOfUser(work, user.id)
    await recordAudit(work, {
      actor,
      action: 'account.changed',
      sentence: `${actor.name} set ${user.name}: ${changed.disabled ? 'disabled' : 'open'}, ${changed.isAdministrator ? 'administrator' : 'no administrator'}.`,
      subject: { kind: 'person', id: user.id, name: user.name },
    })
    return presentAccount(changed, (await projectCountOf(work, [user.id])).get(user.id) ?? 0)
  })
}

function presentAccount(user: User, projectCount: number): Account {
  return {
    id: user.id,
    name: user.name,
    email: user.email,
    isAdministrator: user.isAdministrator,
    disabled: user.disabled,
    createdAt: user.createdAt.toISOString(),
    lastSignInAt: user.lastSignInAt?.toISOString() ?? null,
    projectCount,
  }
}
